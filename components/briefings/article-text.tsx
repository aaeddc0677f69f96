import type { Inline, RenderedParagraph } from "@/lib/briefings/rendered";

/** Runs of text; figures lead to their origin and are isolated, so that digits keep their order in any script. */
export function Inlines({ inlines, linked = true }: { inlines: readonly Inline[]; linked?: boolean }) {
  return inlines.map((inline, index) => {
    if (inline.kind === "text") return inline.text;
    if (inline.kind === "date") {
      return (
        <time key={index} dateTime={inline.iso}>
          {inline.text}
        </time>
      );
    }
    if (inline.interval) {
      return (
        <bdi key={index} className="iv">
          {inline.text}
        </bdi>
      );
    }
    if (!linked) return <bdi key={index}>{inline.text}</bdi>;
    return (
      <a key={index} className="pf" href={`#${inline.ref}`}>
        <bdi>{inline.text}</bdi>
      </a>
    );
  });
}

export function Paragraphs({ paragraphs }: { paragraphs: readonly RenderedParagraph[] }) {
  return paragraphs.map((paragraph) => (
    <p key={paragraph.id} className="col">
      <Inlines inlines={paragraph.inlines} />
    </p>
  ));
}
