import { diffWordsWithSpace } from "diff";
import type { RenderedBriefing } from "@/lib/briefings/rendered";

const textOf = (content: RenderedBriefing): Map<string, string> =>
  new Map([
    ["title", content.title],
    ...content.parts.flatMap(({ paragraphs }) => paragraphs.map(({ id, inlines }) => [id, inlines.map(({ text }) => text).join("")] as const)),
    ...content.schedule.measures.map(({ code, title, detail, from, to }) => [`measure ${code}`, `${title}. ${detail} ${from} – ${to ?? "…"}`] as const),
  ]);

/** Paragraphs that differ between two versions of one language, word by word. */
export function Changes({ before, now, same }: { before: RenderedBriefing; now: RenderedBriefing; same: string }) {
  const [old, present] = [textOf(before), textOf(now)];
  const ids = [...new Set([...present.keys(), ...old.keys()])].filter((id) => old.get(id) !== present.get(id));
  if (ids.length === 0) return <p className="mut">{same}</p>;
  return (
    <ul className="grid gap-3" lang={now.locale} dir={now.locale === "ar" ? "rtl" : "ltr"}>
      {ids.map((id) => (
        <li key={id} className="border-b border-hair pb-3">
          <p>
            {diffWordsWithSpace(old.get(id) ?? "", present.get(id) ?? "").map((part, index) =>
              part.added ? <ins key={index}>{part.value}</ins> : part.removed ? <del key={index}>{part.value}</del> : <span key={index}>{part.value}</span>,
            )}
          </p>
        </li>
      ))}
    </ul>
  );
}
