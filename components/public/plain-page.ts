/** A page of one sentence and at most one button, for a route that answers two methods and so can't be a React page. */
export type PlainPage = {
  locale: string;
  dir: "ltr" | "rtl";
  title: string;
  sentence: string;
  /** Posts back with `from=page`. */
  form: { action: string; button: string } | null;
  links: { href: string; text: string }[];
};

const ENTITIES: Record<string, string> = { "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;" };
const escaped = (text: string): string => text.replace(/[&<>"]/g, (sign) => ENTITIES[sign] ?? sign);

export function plainPage({ locale, dir, title, sentence, form, links }: PlainPage): string {
  const button = form
    ? `<form method="post" action="${escaped(form.action)}"><input type="hidden" name="from" value="page"><button>${escaped(form.button)}</button></form>`
    : "";
  const list = links.map(({ href, text }) => `<li><a href="${escaped(href)}">${escaped(text)}</a></li>`).join("");
  return (
    `<!doctype html><html lang="${escaped(locale)}" dir="${dir}"><head><meta charset="utf-8">` +
    `<meta name="viewport" content="width=device-width,initial-scale=1"><meta name="robots" content="noindex"><title>${escaped(title)}</title>` +
    `<link rel="stylesheet" href="/plain.css"></head><body><main><h1>${escaped(title)}</h1><p role="status">${escaped(sentence)}</p>${button}<ul>${list}</ul></main></body></html>`
  );
}
