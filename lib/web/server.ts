/**
 * The web process: Next's own handler behind a thin layer that fixes the Host, asks every writing request for its
 * origin, sends public pages without any script and staff pages under a strict policy. Listens on loopback.
 */
import { createHmac, randomUUID } from "node:crypto";
import { createServer, type IncomingMessage, type ServerResponse } from "node:http";
import next from "next";
import { env } from "../env";
import { deskPolicy, PUBLIC_POLICY, securityHeaders, withoutScripts } from "./headers";
import { transformHtml } from "./html-response";
import { NotFoundPages } from "./not-found-pages";
import { cacheControl, isPublicPath, needsOrigin } from "./paths";

const LOOPBACK = /^(?:localhost|127(?:\.\d{1,3}){3}|\[::1\])(?::\d+)?$/;
const FORWARDING = ["forwarded", "via", "x-forwarded-for", "x-forwarded-host", "x-forwarded-proto", "x-real-ip"];
/** Asked for by our own processes on loopback, whatever the public name is. */
const INTERNAL = new Set(["/api/health", "/api/internal/revalidate"]);
const STOP_WITHIN_MS = 25_000;

const settings = env();
const publicUrl = new URL(settings.EBBMARK_URL);
const port = Number(process.env["PORT"] ?? (publicUrl.port || 3000));
const hostname = process.env["HOST"] ?? "127.0.0.1";
const dev = process.env["EBBMARK_DEV"] === "1";
const headers = securityHeaders(publicUrl.protocol === "https:");

const notFoundPages = new NotFoundPages();

const app = next({ dev, hostname, port });
await app.prepare();
const handle = app.getRequestHandler();

const server = createServer((request, response) => {
  answer(request, response).catch((error: unknown) => {
    console.log(JSON.stringify({ level: "error", at: new Date().toISOString(), message: "request failed", error: String(error) }));
    if (!response.headersSent) refuse(response, 500, "Something went wrong on our side. Nothing was changed. Please try again.");
    else response.destroy();
  });
});

async function answer(request: IncomingMessage, response: ServerResponse): Promise<void> {
  for (const [name, value] of Object.entries(headers)) response.setHeader(name, value);
  const path = (request.url ?? "/").split("?", 1)[0] ?? "/";
  const host = request.headers.host ?? "";
  const reading = request.method === "GET" || request.method === "HEAD";

  if (host !== publicUrl.host) {
    if (INTERNAL.has(path) && LOOPBACK.test(host)) request.headers.host = publicUrl.host;
    else if (reading && LOOPBACK.test(host) && LOOPBACK.test(publicUrl.host)) {
      response.setHeader("Location", `${publicUrl.origin}${request.url ?? "/"}`);
      return refuse(response, 307, "");
    } else return refuse(response, 421, `This server answers for ${publicUrl.host} only.`);
  }
  if (!reading && needsOrigin(path) && request.headers.origin !== publicUrl.origin) {
    return refuse(response, 403, "This request came from somewhere else, so it was refused. Nothing was changed.");
  }
  if (Number(request.headers["content-length"] ?? 0) > 4_000_000) return refuse(response, 413, "This is too large. The limit is 4 MB.");

  const direct = LOOPBACK.test(host) && FORWARDING.every((name) => request.headers[name] === undefined);
  for (const name of Object.keys(request.headers)) {
    if (name.startsWith("x-middleware-") || name.startsWith("x-ebbmark-direct") || name === "x-forwarded-host") delete request.headers[name];
  }
  // Next adds forwarding headers of its own, so what came from outside is noted here.
  if (direct) request.headers["x-ebbmark-direct"] = "1";
  // A layout can't read the query, and the page's language is the layout's to say.
  delete request.headers["x-ebbmark-lang"];
  const language = /[?&]lang=([a-z]{2})(?:&|$)/.exec(request.url ?? "")?.[1];
  if (language) request.headers["x-ebbmark-lang"] = language;
  request.headers["x-request-id"] = randomUUID();
  response.setHeader("X-Request-Id", request.headers["x-request-id"]);

  const isPublic = isPublicPath(path);
  // Residents' pages carry no script, so nobody needs their other renderings; leaving these out keeps caches clean.
  if (isPublic) {
    for (const name of Object.keys(request.headers)) {
      if (name === "rsc" || name === "next-url" || name.startsWith("next-router") || name === "cookie") delete request.headers[name];
    }
  }
  const accept = String(request.headers["accept-encoding"] ?? "");
  if (!dev) {
    if (!path.startsWith("/_next/static/")) request.headers["accept-encoding"] = "identity";
    transformHtml(response, accept, (html, set) => {
      set("Cache-Control", cacheControl(path));
      const missing = path.startsWith("/desk") ? undefined : notFoundPages.instead(response.statusCode, html, path);
      set("Content-Security-Policy", isPublic || missing ? PUBLIC_POLICY : deskPolicy(html));
      return missing ?? (isPublic ? withoutScripts(html) : html);
    });
  }
  await handle(request, response);
}

function refuse(response: ServerResponse, status: number, sentence: string): void {
  response.writeHead(status, { "Content-Type": "text/plain; charset=utf-8", "Cache-Control": "no-store" });
  response.end(sentence);
}

server.requestTimeout = 60_000;
server.headersTimeout = 15_000;
server.listen(port, hostname, async () => {
  await refresh();
  refreshAtMidnight();
  console.log(JSON.stringify({ level: "info", at: new Date().toISOString(), message: "web ready", url: publicUrl.origin }));
});

/** The build may be older than the database: what it prerendered is asked for anew. */
async function refresh(): Promise<void> {
  const at = String(Date.now());
  const signature = createHmac("sha256", settings.EBBMARK_SECRET).update(`revalidate:${at}`).digest("hex");
  const target = `http://${hostname}:${port}/api/internal/revalidate`;
  await fetch(target, { method: "POST", headers: { "x-at": at, "x-signature": signature } }).catch(() => undefined);
  if (!dev) await notFoundPages.keep(`http://${hostname}:${port}`, publicUrl.host);
}

/** Public pages name the day, so they are made anew when it changes. */
function refreshAtMidnight(): void {
  const now = new Date();
  const midnight = Date.UTC(now.getUTCFullYear(), now.getUTCMonth(), now.getUTCDate() + 1, 0, 0, 1);
  setTimeout(() => {
    refresh().finally(refreshAtMidnight);
  }, midnight - now.getTime()).unref();
}

let stopping = false;
function stop(): void {
  if (stopping) return;
  stopping = true;
  server.close(() => process.exit(0));
  server.closeIdleConnections();
  setTimeout(() => process.exit(0), STOP_WITHIN_MS).unref();
}
process.on("SIGTERM", stop);
process.on("SIGINT", stop);
