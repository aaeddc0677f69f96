import { createServer, type Server } from "node:http";
import type { AddressInfo } from "node:net";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { NotFoundPages } from "@/lib/web/not-found-pages";

const EMPTY = '<!DOCTYPE html><html id="__next_error__"><body></body></html>';
let server: Server;
const pages = new NotFoundPages();
const asked: string[] = [];

beforeAll(async () => {
  server = createServer((request, response) => {
    asked.push(request.headers.host ?? "");
    const locale = request.url?.split("/")[1];
    response.statusCode = locale === "vi" ? 500 : 200;
    response.end(`not found in ${locale}`);
  });
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  await pages.keep(`http://127.0.0.1:${(server.address() as AddressInfo).port}`, "briefings.example.org");
});
afterAll(() => server.close());

describe("pages that aren't there", () => {
  test("are asked for under the public name", () => expect(new Set(asked)).toEqual(new Set(["briefings.example.org"])));

  test.each([
    ["/ar/briefings/none", "not found in ar"],
    ["/en/x", "not found in en"],
    ["/zz/x", "not found in en"],
    ["/", "not found in en"],
  ])("%s gets its language's page", (path, page) => expect(pages.instead(404, EMPTY, path)).toBe(page));

  test("one that can't be had isn't replaced by an error", () => expect(pages.instead(404, EMPTY, "/vi/x")).toBeUndefined());

  test.each([
    [200, EMPTY],
    [404, "<!DOCTYPE html><html lang='en'><h1>This link is not complete</h1></html>"],
    [500, EMPTY],
  ])("an answer with status %i that can be read stays", (status, html) => expect(pages.instead(status, html, "/en/x")).toBeUndefined());
});
