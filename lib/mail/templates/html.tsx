import type { CSSProperties, ReactNode } from "react";
import { renderToStaticMarkup } from "react-dom/server";
import { LOCALES } from "../../i18n/locales";
import type { FigureRow, FootLine, MailBlock, MailModel } from "../model";

// Mail programs drop style sheets, so the light look stands in attributes and only the dark one in a sheet.
const COLOUR = { paper: "#f2f4ef", sheet: "#fcfdfa", ink: "#21241f", ink2: "#4a4f47", hair: "#d2d7cc", tide: "#175b56", onTide: "#fffcf5", brassWash: "#f5e8c8" };
const WATER = [
  ["#7fa8a0", 4],
  ["#a9c5bc", 6],
  ["#cfddd3", 9],
] as const;
const DARK = `
:root{color-scheme:light dark;supported-color-schemes:light dark}
@media (prefers-color-scheme:dark){
.m-paper{background-color:#191b18!important}.m-sheet{background-color:#222520!important;border-color:#ecefe8!important}
.m-ink{color:#ecefe8!important}.m-ink2{color:#c4cabe!important}.m-hair{border-color:#3d4238!important}.m-rule{border-color:#ecefe8!important}
.m-link{color:#8acbbc!important}.m-button{background-color:#8acbbc!important;color:#14211e!important}.m-notice{background-color:#3a3016!important;border-color:#ecefe8!important}
}
@media (max-width:480px){.m-cell{padding-left:20px!important;padding-right:20px!important}}`;

const FONT = "'Noto Sans','Noto Sans Arabic','Noto Sans Devanagari',system-ui,-apple-system,'Segoe UI',Roboto,Arial,sans-serif";
const base: CSSProperties = { fontFamily: FONT, color: COLOUR.ink, fontSize: 16, lineHeight: "26px" };
const small: CSSProperties = { ...base, color: COLOUR.ink2, fontSize: 14, lineHeight: "21px" };
const hairline = `1px solid ${COLOUR.hair}`;
const plainTable = { role: "presentation", width: "100%", cellSpacing: 0, cellPadding: 0, border: 0 } as const;

/** The HTML part: tables for layout, no picture, no script, nothing from elsewhere. */
export function toHtml(mail: MailModel): string {
  const { dir } = LOCALES[mail.locale];
  const markup = renderToStaticMarkup(
    <html lang={mail.locale} dir={dir}>
      {/* biome-ignore lint/style/noHeadElement: a mail is no page of the site */}
      <head>
        <meta charSet="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <meta name="color-scheme" content="light dark" />
        <meta name="supported-color-schemes" content="light dark" />
        <title>{mail.subject}</title>
        {/* biome-ignore lint/security/noDangerouslySetInnerHtml: a constant of this file; React would escape its signs. */}
        <style dangerouslySetInnerHTML={{ __html: DARK }} />
      </head>
      <body className="m-paper" style={{ margin: 0, padding: 0, backgroundColor: COLOUR.paper }}>
        {/* Some programs drop <html>: language and direction stand here again. */}
        <div lang={mail.locale} dir={dir} className="m-paper" style={{ backgroundColor: COLOUR.paper }}>
          <table {...plainTable}>
            <tbody>
              <tr>
                <td align="center" style={{ padding: "28px 12px" }}>
                  <table {...plainTable} className="m-sheet" style={{ maxWidth: 600, backgroundColor: COLOUR.sheet, borderTop: `3px solid ${COLOUR.ink}` }}>
                    <tbody>
                      <Sheet mail={mail} />
                    </tbody>
                  </table>
                </td>
              </tr>
            </tbody>
          </table>
        </div>
      </body>
    </html>,
  );
  // Paragraphs on lines of their own: what differs between readers then stands in a line apart (compose.ts).
  return `<!doctype html>${markup.replaceAll("<p ", "\n<p ").replaceAll("</p>", "</p>\n")}`;
}

function Sheet({ mail }: { mail: MailModel }) {
  return (
    <>
      <Row top={22}>
        <p className="m-ink" style={{ ...base, margin: 0, fontSize: 15, lineHeight: "22px", fontWeight: 600 }}>
          {mail.sender}
        </p>
        <Waterline />
        <h1 className="m-ink" style={{ ...base, margin: "14px 0 0", fontSize: 27, lineHeight: "34px", fontWeight: 600 }}>
          {mail.title}
        </h1>
        {mail.meta === null ? null : (
          <p className="m-ink2" style={{ ...small, margin: "8px 0 0" }}>
            {mail.meta}
          </p>
        )}
      </Row>
      {mail.blocks.map((block, index) => (
        <Row key={index} top={block.kind === "text" ? 14 : 22}>
          <Block block={block} />
        </Row>
      ))}
      <Row top={26} bottom={30}>
        <div className="m-hair" style={{ borderTop: hairline, paddingTop: 14 }}>
          {mail.foot.map((line, index) => (
            <Foot key={index} line={line} first={index === 0} />
          ))}
        </div>
      </Row>
    </>
  );
}

function Row({ top, bottom = 0, children }: { top: number; bottom?: number; children: ReactNode }) {
  return (
    <tr>
      <td className="m-cell" style={{ padding: `${top}px 36px ${bottom}px` }}>
        {children}
      </td>
    </tr>
  );
}

const Waterline = () => (
  <div aria-hidden="true" style={{ marginTop: 12 }}>
    {WATER.map(([colour, height]) => (
      <div key={colour} style={{ borderTop: `1px solid ${colour}`, height, fontSize: 0, lineHeight: 0 }} />
    ))}
  </div>
);

function Block({ block }: { block: MailBlock }) {
  switch (block.kind) {
    case "text":
      return (
        <p className="m-ink" style={{ ...base, margin: 0 }}>
          {block.text}
        </p>
      );
    case "notice":
      return (
        <div lang={block.lang} dir={LOCALES[block.lang].dir} className="m-notice" style={{ borderTop: `2px solid ${COLOUR.ink}`, backgroundColor: COLOUR.brassWash, padding: "12px 16px" }}>
          <p className="m-ink" style={{ ...base, margin: 0, fontWeight: 600 }}>
            {block.lead}
          </p>
          {block.texts.map((text, index) => (
            <p key={index} className="m-ink" style={{ ...base, margin: "6px 0 0" }}>
              {text}
            </p>
          ))}
        </div>
      );
    case "figures":
      return <Figures head={block.head} rows={block.rows} note={block.note} />;
    case "changes":
      return <Changes {...block} />;
    case "list":
      return (
        <>
          <h2 className="m-ink" style={{ ...base, margin: 0, fontWeight: 600 }}>
            {block.title}
          </h2>
          {block.items.map(({ title, text }, index) => (
            <p key={index} className="m-ink m-hair" style={{ ...base, margin: "8px 0 0", paddingTop: 8, borderTop: hairline }}>
              {title}
              <br />
              <span className="m-ink2" style={{ color: COLOUR.ink2, fontSize: 15 }}>
                {text}
              </span>
            </p>
          ))}
        </>
      );
    case "button":
      return (
        <a
          href={block.link.href}
          className="m-button"
          style={{ ...base, display: "inline-block", backgroundColor: COLOUR.tide, color: COLOUR.onTide, fontWeight: 600, textDecoration: "none", padding: "11px 20px", borderRadius: 2 }}
        >
          {block.link.text}
        </a>
      );
  }
}

const ruled: CSSProperties = { width: "100%", borderTop: `2px solid ${COLOUR.ink}`, borderCollapse: "collapse" };
// Read out, not shown: the columns are plain to see, but not to hear.
const unseen: CSSProperties = { position: "absolute", width: 1, height: 1, overflow: "hidden", clip: "rect(0 0 0 0)", fontSize: 1, lineHeight: "1px", color: "transparent", padding: 0 };
const cell: CSSProperties = { padding: "10px 0", borderBottom: hairline, textAlign: "start", verticalAlign: "baseline" };

function Figures({ head, rows, note }: { head: readonly string[]; rows: FigureRow[]; note: string }) {
  return (
    <>
      <table width="100%" cellSpacing={0} cellPadding={0} className="m-rule" style={ruled}>
        <thead>
          <tr>
            {head.map((title) => (
              <th key={title} scope="col" style={{ padding: 0, lineHeight: 0 }}>
                <span style={unseen}>{title}</span>
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map(({ label, value, range }) => (
            <tr key={label}>
              <th scope="row" className="m-ink m-hair" style={{ ...base, ...cell, width: "56%", fontSize: 15, lineHeight: "22px", fontWeight: 400 }}>
                {label}
              </th>
              <td className="m-ink m-hair" style={{ ...base, ...cell, paddingInlineStart: 12, fontSize: 17, lineHeight: "22px", fontWeight: 600, textAlign: "end" }}>
                <bdi>{value}</bdi>
              </td>
              <td className="m-ink2 m-hair" style={{ ...small, ...cell, paddingInlineStart: 12, textAlign: "end" }}>
                {range === null ? null : <bdi>{range}</bdi>}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {note === "" ? null : (
        <p className="m-ink2" style={{ ...small, margin: "8px 0 0" }}>
          {note}
        </p>
      )}
    </>
  );
}

function Changes({ title, head, rows }: Extract<MailBlock, { kind: "changes" }>) {
  return (
    <table width="100%" cellSpacing={0} cellPadding={0} className="m-rule" style={ruled}>
      <caption className="m-ink" style={{ ...base, textAlign: "start", fontWeight: 600, paddingBottom: 6 }}>
        {title}
      </caption>
      <thead>
        <tr>
          {head.map((text, index) => (
            <th key={text} scope="col" className="m-ink2 m-hair" style={{ ...small, ...cell, fontWeight: 400, textAlign: index === 0 ? "start" : "end" }}>
              {text}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map(({ label, before, now }) => (
          <tr key={label}>
            <th scope="row" className="m-ink m-hair" style={{ ...base, ...cell, width: "56%", fontSize: 15, lineHeight: "22px", fontWeight: 400 }}>
              {label}
            </th>
            <td className="m-ink2 m-hair" style={{ ...small, ...cell, paddingInlineStart: 12, textAlign: "end" }}>
              <bdi>{before}</bdi>
            </td>
            <td className="m-ink m-hair" style={{ ...base, ...cell, paddingInlineStart: 12, fontWeight: 600, textAlign: "end" }}>
              <bdi>{now}</bdi>
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function Foot({ line: { text, links }, first }: { line: FootLine; first: boolean }) {
  return (
    <p className="m-ink2" style={{ ...small, margin: first ? 0 : "12px 0 0" }}>
      {text}
      {links.map(({ text: words, href }, index) => (
        <span key={href}>
          {index === 0 ? (text === "" ? "" : " ") : " · "}
          <a href={href} className="m-link" style={{ color: COLOUR.tide }}>
            {words}
          </a>
        </span>
      ))}
    </p>
  );
}
