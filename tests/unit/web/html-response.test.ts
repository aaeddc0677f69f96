import { createServer, type IncomingMessage, type Server, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";
import { brotliDecompressSync } from "node:zlib";
import { afterEach, expect, test } from "vitest";
import { transformHtml } from "@/lib/web/html-response";

let server: Server | undefined;
afterEach(() => new Promise((resolve) => (server ? server.close(resolve) : resolve(undefined))));

async function serve(answer: (request: IncomingMessage, response: ServerResponse) => void): Promise<string> {
  server = createServer((request, response) => {
    transformHtml(response, String(request.headers["accept-encoding"] ?? ""), (html, set) => {
      set("X-Seen", String(html.length));
      return html.replaceAll("old", "new");
    });
    answer(request, response);
  });
  await new Promise<void>((resolve) => server?.listen(0, "127.0.0.1", resolve));
  return `http://127.0.0.1:${(server.address() as AddressInfo).port}/`;
}
const read = (url: string, init: RequestInit = {}) => fetch(url, { ...init, headers: { "accept-encoding": "identity", ...init.headers } });

test("an HTML answer written in pieces is transformed whole and has its length", async () => {
  const url = await serve((_, response) => {
    response.writeHead(201, { "Content-Type": "text/html; charset=utf-8" });
    response.write("<p>ol");
    response.write(Buffer.from("d é"));
    response.end("</p>");
  });
  const answer = await read(url);
  expect(answer.status).toBe(201);
  expect(await answer.text()).toBe("<p>new é</p>");
  expect(answer.headers.get("content-length")).toBe("13");
  expect(answer.headers.get("x-seen")).toBe("12");
});

test("a piece that is cut inside a character survives", async () => {
  const bytes = Buffer.from("<p>عربي</p>");
  const url = await serve((_, response) => {
    response.setHeader("Content-Type", "text/html");
    response.write(bytes.subarray(0, 4));
    response.end(bytes.subarray(4));
  });
  expect(await (await read(url)).text()).toBe("<p>عربي</p>");
});

test("anything else passes through as it comes", async () => {
  const url = await serve((_, response) => {
    response.setHeader("Content-Type", "application/json");
    response.write('{"a":');
    response.end('"old"}');
  });
  const answer = await read(url);
  expect(await answer.json()).toEqual({ a: "old" });
  expect(answer.headers.get("x-seen")).toBeNull();
});

test("HTML is compressed for those who take it, with a weak tag", async () => {
  const url = await serve((_, response) => {
    response.setHeader("Content-Type", "text/html");
    response.setHeader("ETag", '"abc"');
    response.end(`<p>${"old ".repeat(500)}</p>`);
  });
  const { request } = await import("node:http");
  const answer = await new Promise<{ headers: Record<string, unknown>; body: Buffer }>((resolve) =>
    request(url, { headers: { "accept-encoding": "br" } }, (response) => {
      const chunks: Buffer[] = [];
      response.on("data", (chunk: Buffer) => chunks.push(chunk)).on("end", () => resolve({ headers: response.headers, body: Buffer.concat(chunks) }));
    }).end(),
  );
  expect(answer.headers["content-encoding"]).toBe("br");
  expect(answer.headers["etag"]).toBe('W/"abc"');
  expect(answer.headers["vary"]).toContain("Accept-Encoding");
  expect(brotliDecompressSync(answer.body).toString()).toBe(`<p>${"new ".repeat(500)}</p>`);
});

test("whoever wraps the head afterwards hears of it before a streamed body goes on", async () => {
  let heard = 0;
  const url = await serve((_, response) => {
    // What compression does: it waits for the head before it lets anybody wait for "drain".
    const inner = response.writeHead.bind(response) as (...all: unknown[]) => ServerResponse;
    response.writeHead = ((...all: unknown[]) => {
      heard++;
      return inner(...all);
    }) as ServerResponse["writeHead"];
    response.setHeader("Content-Type", "application/x-ndjson");
    response.flushHeaders();
    response.write("first\n");
    response.end("last\n");
  });
  expect(await (await read(url)).text()).toBe("first\nlast\n");
  expect(heard).toBe(1);
});
