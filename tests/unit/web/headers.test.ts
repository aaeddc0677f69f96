import { createHash } from "node:crypto";
import { describe, expect, test } from "vitest";
import { deskPolicy, PUBLIC_POLICY, securityHeaders, withoutScripts } from "@/lib/web/headers";
import { cacheControl, isPublicPath, needsOrigin } from "@/lib/web/paths";

const PAGE = `<html><head><link rel="preload" as="script" href="/a.js"/><link rel="stylesheet" href="/a.css"/><script src="/a.js" async=""></script></head><body><p>a &lt;script&gt; b</p><script>self.x=1</script><script id="y">self.y="</p>"</script></body></html>`;

describe("public pages", () => {
  test("lose every script and script preload, and nothing else", () => {
    expect(withoutScripts(PAGE)).toBe(`<html><head><link rel="stylesheet" href="/a.css"/></head><body><p>a &lt;script&gt; b</p></body></html>`);
  });
  test("may run no script at all", () => {
    expect(PUBLIC_POLICY).toContain("script-src 'none'");
    expect(PUBLIC_POLICY).not.toContain("unsafe");
  });
  test.each([
    ["/", true], ["/en", true], ["/ar/briefings/x", true], ["/u/abc", true], ["/desk", false], ["/sign-in", false], ["/english", false], ["/api/health", false],
  ])("%s is public: %s", (path, is) => expect(isPublicPath(path)).toBe(is));
  test("readable pages may be kept for a minute, pages with forms not at all", () => {
    expect(cacheControl("/en/briefings/x")).toBe("public, max-age=60, must-revalidate");
    for (const path of ["/en/subscribe", "/ar/confirm/x", "/en/subscription/x", "/u/x", "/desk", "/sign-in"]) expect(cacheControl(path)).toBe("no-store");
  });
  test("only one-click unsubscribe and our own refresh need name no origin", () => {
    expect(["/u/x", "/api/internal/revalidate", "/desk", "/en/subscribe", "/sign-in"].filter((path) => !needsOrigin(path))).toEqual(["/u/x", "/api/internal/revalidate"]);
  });
});

describe("staff pages", () => {
  test("allow exactly the inline scripts that they hold", () => {
    const hash = (text: string) => `'sha256-${createHash("sha256").update(text).digest("base64")}'`;
    expect(deskPolicy(PAGE)).toContain(`script-src 'self' ${hash("self.x=1")} ${hash('self.y="</p>"')}`);
    expect(deskPolicy(PAGE)).not.toContain("unsafe");
  });
  test("HSTS is sent over https only", () => {
    expect(securityHeaders(true)).toHaveProperty("Strict-Transport-Security");
    expect(securityHeaders(false)).not.toHaveProperty("Strict-Transport-Security");
  });
});
