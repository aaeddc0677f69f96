import http from "node:http";
import { simpleParser } from "mailparser";
import type { SinkEntry, SinkStore } from "./sink-store";

const PER_PAGE = 50;
const STYLE = `:root{color-scheme:light dark;--paper:#f2f4ef;--sheet:#fcfdfa;--ink:#21241f;--soft:#4a4f47;--hair:#d2d7cc;--rule:#7f877a;--tide:#175b56;--on:#fffcf5}
@media (prefers-color-scheme:dark){:root{--paper:#191b18;--sheet:#222520;--ink:#ecefe8;--soft:#c4cabe;--hair:#3d4238;--rule:#7f877a;--tide:#8acbbc;--on:#14211e}}
body{font:15px/24px "Noto Sans",system-ui,sans-serif;background:var(--paper);color:var(--ink);max-width:66rem;margin:32px auto;padding:0 20px}
a{color:var(--tide)}h1{font-size:27px;line-height:36px;font-weight:600;margin:0 0 8px}p{margin:0 0 16px}.soft,th{color:var(--soft)}
table{border-collapse:collapse;width:100%;border-top:2px solid var(--ink);margin:16px 0}th,td{text-align:start;padding:8px 16px 8px 0;border-bottom:1px solid var(--hair);vertical-align:baseline;overflow-wrap:anywhere}
th,td:first-child{font-size:13px;white-space:nowrap;font-weight:400}td:first-child{font-variant-numeric:tabular-nums;color:var(--soft)}
iframe{width:100%;height:52rem;border:1px solid var(--hair);background:var(--sheet)}pre{white-space:pre-wrap;overflow-wrap:anywhere;font-size:13px;line-height:20px}
label{font-weight:600}input{font:inherit;color:inherit;background:var(--sheet);border:1px solid var(--rule);border-radius:2px;padding:8px 12px;min-width:16rem;margin-inline-start:8px}
button{font:inherit;font-weight:600;color:var(--on);background:var(--tide);border:0;border-radius:2px;padding:9px 18px}summary{cursor:pointer;padding:8px 0}
a:focus-visible,input:focus-visible,button:focus-visible,summary:focus-visible{outline:2px solid var(--tide);outline-offset:2px}`;
const POLICY = "default-src 'none'; style-src 'unsafe-inline'; frame-src 'self'; form-action 'self'; base-uri 'none'; frame-ancestors 'none'";
// Nothing in a mail may run or load anything; its links open in a window of their own.
const MAIL_POLICY = "sandbox allow-popups allow-popups-to-escape-sandbox; default-src 'none'; style-src 'unsafe-inline'; frame-ancestors 'self'";

type Reply = { status?: number; type?: string; policy?: string; body: string | Buffer };

/** Shows on loopback what the sink got: `/`, `/messages/ID`, and for programs `/messages?to=…` and `/index.json`. */
export async function openSinkWeb({ port, store }: { port: number; store: SinkStore }): Promise<http.Server> {
  const server = http.createServer((request, response) => {
    answer(request, store)
      .catch((): Reply => ({ status: 500, type: "text/plain", body: "This could not be shown." }))
      .then(({ status = 200, type = "text/html", policy = POLICY, body }) => {
        response.writeHead(status, { "Content-Type": `${type}; charset=utf-8`, "Content-Security-Policy": policy, "X-Content-Type-Options": "nosniff", "Referrer-Policy": "no-referrer", "Cache-Control": "no-store" });
        response.end(body);
      });
  });
  await new Promise<void>((resolve, reject) => {
    server.once("error", reject);
    server.listen(port, "127.0.0.1", resolve);
  });
  return server;
}

async function answer(request: http.IncomingMessage, store: SinkStore): Promise<Reply> {
  // Another site's name that points here must not read mail with a visitor's browser.
  if (!/^(127\.0\.0\.1|localhost)(:\d+)?$/.test(request.headers.host ?? "")) return { status: 421, type: "text/plain", body: "Only by its loopback address." };
  if (request.method !== "GET" && request.method !== "HEAD") return { status: 405, type: "text/plain", body: "This can only be read." };
  const url = new URL(request.url ?? "/", "http://127.0.0.1");
  if (url.pathname === "/") return listPage(store, url.searchParams);
  if (url.pathname === "/index.json") return json(store.entries());
  if (url.pathname === "/messages") return json(await search(store, url.searchParams));
  const [, id, part] = /^\/messages\/(\d+)(?:\/(raw|html|json))?$/.exec(url.pathname) ?? [];
  const entry = store.entries().find((each) => each.id === Number(id));
  const raw = entry ? store.raw(entry.id) : null;
  if (!entry || !raw) return { status: 404, type: "text/plain", body: "There is no such mail." };
  if (part === "raw") return { type: "text/plain", body: raw };
  if (part === "json") return json(await parsed(entry, raw));
  if (part === "html") return { policy: MAIL_POLICY, body: `<base target="_blank">${(await parsed(entry, raw)).html}` };
  return messagePage(entry, raw);
}

const json = (value: unknown): Reply => ({ type: "application/json", body: JSON.stringify(value) });

async function parsed(entry: SinkEntry, raw: Buffer) {
  const mail = await simpleParser(raw, { skipTextToHtml: true, skipHtmlToText: true, skipTextLinks: true });
  return { ...entry, subject: mail.subject ?? "", text: mail.text ?? "", html: mail.html === false ? "" : mail.html };
}

const matching = (store: SinkStore, to: string): SinkEntry[] => store.entries().filter((entry) => entry.to.toLowerCase().includes(to.toLowerCase()));

/** Newest first, with their text: what tests ask for. */
async function search(store: SinkStore, query: URLSearchParams) {
  const found = matching(store, query.get("to") ?? "");
  const newest = found.slice(-PER_PAGE).reverse();
  const messages = await Promise.all(newest.map((entry) => parsed(entry, store.raw(entry.id) ?? Buffer.alloc(0))));
  return { total: found.length, messages };
}

async function subjectOf(store: SinkStore, { id }: SinkEntry): Promise<string> {
  const raw = store.raw(id) ?? Buffer.alloc(0);
  const end = raw.indexOf("\r\n\r\n");
  return (await simpleParser(end < 0 ? raw : raw.subarray(0, end + 4))).subject ?? "";
}

async function listPage(store: SinkStore, query: URLSearchParams): Promise<Reply> {
  const to = query.get("to") ?? "";
  const page = Math.max(1, Number(query.get("page")) || 1);
  const found = matching(store, to);
  const shown = found.slice(Math.max(0, found.length - page * PER_PAGE), found.length - (page - 1) * PER_PAGE).reverse();
  const rows = await Promise.all(
    shown.map(async (entry) => `<tr><td>${escaped(entry.at.slice(0, 19).replace("T", " "))}</td><td>${escaped(entry.to)}</td><td><a href="/messages/${entry.id}">${escaped(await subjectOf(store, entry)) || "(no subject)"}</a></td></tr>`),
  );
  const link = (number: number, words: string) => `<a href="/?${new URLSearchParams({ ...(to ? { to } : {}), page: String(number) })}">${words}</a> `;
  return html(
    "Mail sink",
    `<h1>Mail that was “sent”</h1><p>This is the demonstration’s own mail server. It keeps mail and sends nothing on. ${to ? `${found.length} of ${store.entries().length} mails go to this address.` : `${found.length} mails.`}</p>
<form><label>To <input name="to" value="${escaped(to)}"></label> <button>Search</button></form>
${rows.length === 0 ? "<p>Nothing here yet.</p>" : `<table><thead><tr><th scope="col">Time (UTC)</th><th scope="col">To</th><th scope="col">Subject</th></tr></thead><tbody>${rows.join("")}</tbody></table>`}
<p>${page > 1 ? link(page - 1, "Newer") : ""}${found.length > page * PER_PAGE ? link(page + 1, "Older") : ""}</p>`,
  );
}

async function messagePage(entry: SinkEntry, raw: Buffer): Promise<Reply> {
  const mail = await parsed(entry, raw);
  const head = raw.subarray(0, Math.max(0, raw.indexOf("\r\n\r\n"))).toString("utf8");
  return html(
    mail.subject,
    `<p><a href="/">All mail</a></p><h1 dir="auto">${escaped(mail.subject)}</h1><p>To ${escaped(entry.to)}, ${escaped(entry.at.slice(0, 19).replace("T", " "))} UTC, ${entry.size} bytes</p>
${mail.html ? `<iframe title="The mail as HTML" sandbox="allow-popups allow-popups-to-escape-sandbox" src="/messages/${entry.id}/html"></iframe>` : ""}
<details${mail.html ? "" : " open"}><summary>As text</summary><pre dir="auto">${escaped(mail.text)}</pre></details>
<details><summary>Header fields</summary><pre>${escaped(head)}</pre></details>
<p><a href="/messages/${entry.id}/raw">The whole source</a></p>`,
  );
}

const html = (title: string, body: string): Reply => ({
  body: `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width,initial-scale=1"><title>${escaped(title)}</title><style>${STYLE}</style></head><body>${body}</body></html>`,
});
const SIGNS: Record<string, string> = { "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;" };
const escaped = (text: string): string => text.replace(/[&<>"]/g, (sign) => SIGNS[sign] ?? sign);
