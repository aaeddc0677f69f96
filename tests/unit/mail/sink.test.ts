import fs from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterEach, describe, expect, test } from "vitest";
import { scriptOf, scriptReader } from "@/lib/mail/sink-script";
import { openStore } from "@/lib/mail/sink-store";
import { openSinkWeb } from "@/lib/mail/sink-web";

const folders: string[] = [];
const folder = () => {
  const made = fs.mkdtempSync(path.join(os.tmpdir(), "ebbmark-sink-"));
  folders.push(made);
  return made;
};
afterEach(() => {
  for (const made of folders.splice(0)) fs.rmSync(made, { recursive: true, force: true });
});
const mail = (to: string, extra = "") => ({ from: "a@example.org", to, raw: Buffer.from(`Message-ID: <m-${to}>\r\nSubject: =?UTF-8?Q?D=C3=ADa?=\r\nContent-Type: text/html; charset=utf-8\r\n\r\n<p>Hello</p>${extra}`) });

describe("recipients script the sink", () => {
  test.each([
    ["reply-450+7@example.org", { act: "reply", at: "rcpt", code: 450, text: "as the address asks for" }],
    ["reply-550-5.1.1@example.org", { act: "reply", at: "rcpt", code: 550, text: "5.1.1 as the address asks for" }],
    ["data-554@example.org", { act: "reply", at: "data", code: 554, text: "as the address asks for" }],
    ["drop-after-dot@example.org", { act: "drop", at: "afterDot", taken: true }],
    ["silent-at-rcpt@example.org", { act: "silent", at: "rcpt" }],
    ["reply-250@example.org", { act: "take" }],
    ["anna@example.org", { act: "take" }],
  ])("%s", (address, script) => expect(scriptOf(address.split("@")[0]?.split("+")[0] ?? "")).toEqual(script));

  test("“-once” means the first time for each address", () => {
    const read = scriptReader();
    expect(read("reply-450-once+1@example.org").act).toBe("reply");
    expect(read("reply-450-once+1@example.org").act).toBe("take");
    expect(read("reply-450-once+2@example.org").act).toBe("reply");
  });
});

describe("the store", () => {
  test("finds again what a folder holds, and drops a line that a crash cut short", () => {
    const dir = folder();
    const first = openStore(dir);
    first.add(mail("one@example.org"));
    first.add(mail("two@example.org"));
    first.close();
    fs.appendFileSync(path.join(dir, "messages.ndjson"), '{"id":3,"at":"2027');
    const second = openStore(dir);
    expect(second.entries().map(({ id, to, messageId }) => [id, to, messageId])).toEqual([
      [1, "one@example.org", "<m-one@example.org>"],
      [2, "two@example.org", "<m-two@example.org>"],
    ]);
    expect(second.raw(2)?.toString()).toContain("<p>Hello</p>");
    expect(second.add(mail("three@example.org")).id).toBe(3);
    expect(second.raw(3)?.toString()).toContain("m-three");
    second.close();
    const third = openStore(dir);
    expect(third.entries()).toHaveLength(3);
    third.close();
  });

  test("works without a folder", () => {
    const store = openStore(null);
    store.add(mail("one@example.org"));
    expect(store.entries()).toHaveLength(1);
    expect(store.raw(1)?.length).toBeGreaterThan(0);
    expect(store.raw(2)).toBeNull();
  });
});

describe("the page that shows the mail", () => {
  const withPage = async (run: (base: string) => Promise<void>) => {
    const store = openStore(null);
    store.add(mail("one@example.org", "<script>alert(1)</script>"));
    store.add(mail("two@example.org"));
    const web = await openSinkWeb({ port: 0, store });
    const address = web.address();
    try {
      await run(`http://127.0.0.1:${typeof address === "object" && address ? address.port : 0}`);
    } finally {
      web.closeAllConnections();
      web.close();
    }
  };

  test("lists, searches by recipient and answers programs", () =>
    withPage(async (base) => {
      expect(await (await fetch(`${base}/`)).text()).toContain("Día");
      const found = (await (await fetch(`${base}/messages?to=two@`)).json()) as { total: number; messages: { to: string; subject: string }[] };
      expect(found.total).toBe(1);
      expect(found.messages[0]).toMatchObject({ to: "two@example.org", subject: "Día" });
      expect(((await (await fetch(`${base}/index.json`)).json()) as unknown[]).length).toBe(2);
      expect((await fetch(`${base}/messages/9`)).status).toBe(404);
    }));

  test("a mail's HTML can run and load nothing", () =>
    withPage(async (base) => {
      const page = await fetch(`${base}/messages/1`);
      expect(await page.text()).toMatch(/<iframe [^>]*sandbox="allow-popups allow-popups-to-escape-sandbox"/);
      const policy = (await fetch(`${base}/messages/1/html`)).headers.get("content-security-policy") ?? "";
      expect(policy).toMatch(/^sandbox (?!.*allow-scripts)(?!.*allow-same-origin)/);
      expect(policy).toContain("default-src 'none'");
    }));

  test("answers only by its loopback name, and only reads", () =>
    withPage(async (base) => {
      expect((await fetch(`${base}/`, { method: "POST" })).status).toBe(405);
      const { default: http } = await import("node:http");
      const status = await new Promise((resolve) => {
        http.get(`${base}/`, { headers: { host: "evil.example" } }, (response) => resolve(response.resume().statusCode));
      });
      expect(status).toBe(421);
    }));
});
