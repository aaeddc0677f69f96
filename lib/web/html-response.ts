import type { ServerResponse } from "node:http";
import { brotliCompressSync, constants, gzipSync } from "node:zlib";

type Chunk = string | Uint8Array;

/**
 * Holds an HTML answer back until it is whole, hands it to `transform`, compresses it and sends it with its length.
 * Every other kind of answer passes through untouched, as it comes.
 */
export function transformHtml(
  response: ServerResponse,
  acceptEncoding: string,
  transform: (html: string, set: (name: string, value: string) => void) => string,
): void {
  const chunks: Buffer[] = [];
  let mode: "undecided" | "hold" | "pass" = "undecided";
  const original = {
    writeHead: response.writeHead.bind(response),
    write: response.write.bind(response),
    end: response.end.bind(response),
    flushHeaders: response.flushHeaders.bind(response),
  };
  const decide = () => {
    if (mode === "undecided") {
      const html = String(response.getHeader("content-type") ?? "").startsWith("text/html");
      mode = html && response.statusCode !== 304 && response.req.method !== "HEAD" ? "hold" : "pass";
    }
    return mode;
  };
  /**
   * From here on Node writes the head itself, with the headers as they stand. Through `writeHead` and not in its place:
   * whoever wrapped it meanwhile (compression, which holds "drain" back until the head goes out) must hear of it.
   */
  let released = false;
  const release = () => {
    released = true;
  };
  const passes = () => {
    const passing = decide() === "pass";
    if (passing) release();
    return passing;
  };
  const keep = (chunk: Chunk, encoding?: unknown) =>
    chunks.push(typeof chunk === "string" ? Buffer.from(chunk, typeof encoding === "string" ? (encoding as BufferEncoding) : "utf8") : Buffer.from(chunk));

  // Headers given with the status are kept on the response, so that they can still change.
  response.writeHead = ((status: number, ...rest: unknown[]) => {
    if (released) return (original.writeHead as (...all: unknown[]) => ServerResponse)(status, ...rest);
    const headers = rest.find((each) => typeof each === "object" && each !== null) as Record<string, string> | undefined;
    response.statusCode = status;
    for (const [name, value] of Object.entries(headers ?? {})) response.setHeader(name, value);
    return response;
  }) as ServerResponse["writeHead"];
  response.flushHeaders = () => {
    if (passes()) original.flushHeaders();
  };
  response.write = ((chunk: Chunk, ...rest: unknown[]) => {
    if (passes()) return (original.write as (...all: unknown[]) => boolean)(chunk, ...rest);
    keep(chunk, rest[0]);
    for (const each of rest) if (typeof each === "function") queueMicrotask(each as () => void);
    return true;
  }) as ServerResponse["write"];
  response.end = ((...args: unknown[]) => {
    if (passes()) return (original.end as (...all: unknown[]) => ServerResponse)(...args);
    const callback = args.find((each) => typeof each === "function");
    if (args[0] !== undefined && typeof args[0] !== "function") keep(args[0] as Chunk, args[1]);
    const html = transform(Buffer.concat(chunks).toString("utf8"), (name, value) => response.setHeader(name, value));
    const body = compress(response, Buffer.from(html, "utf8"), acceptEncoding);
    response.removeHeader("transfer-encoding");
    response.setHeader("Content-Length", body.byteLength);
    release();
    return original.end(body, callback as () => void);
  }) as ServerResponse["end"];
}

function compress(response: ServerResponse, body: Buffer, accept: string): Buffer {
  response.appendHeader("Vary", "Accept-Encoding");
  const etag = response.getHeader("etag");
  if (typeof etag === "string" && !etag.startsWith("W/")) response.setHeader("ETag", `W/${etag}`);
  if (body.byteLength < 512) return body;
  if (/\bbr\b/.test(accept)) {
    response.setHeader("Content-Encoding", "br");
    return brotliCompressSync(body, { params: { [constants.BROTLI_PARAM_QUALITY]: 5 } });
  }
  if (/\bgzip\b/.test(accept)) {
    response.setHeader("Content-Encoding", "gzip");
    return gzipSync(body);
  }
  return body;
}
