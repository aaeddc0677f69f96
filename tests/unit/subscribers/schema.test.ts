import { describe, expect, test } from "vitest";
import { networkOf } from "@/lib/subscribers/network";
import { addressFault, RequestSubscriptionInput } from "@/lib/subscribers/schema";

const ask = (email: string) => RequestSubscriptionInput.safeParse({ email, locale: "ar", page: "ar" });

describe("an address", () => {
  test.each([
    ["  Mina@Example.ORG ", "mina@example.org"],
    ["o'neil+news@sub.example.co", "o'neil+news@sub.example.co"],
    ["leser@bücher.example", "leser@xn--bcher-kva.example"],
  ])("%s is kept as %s", (typed, kept) => expect(ask(typed).data?.email).toBe(kept));

  test.each([
    ["", "emailMissing"],
    ["   ", "emailMissing"],
    ["mina", "emailAt"],
    ["mina@", "emailAt"],
    ["a@b@example.org", "emailAt"],
    [".mina@example.org", "emailBefore"],
    ["mina.@example.org", "emailBefore"],
    ["mi na@example.org", "emailBefore"],
    [`${"a".repeat(65)}@example.org`, "emailBefore"],
    ["ميناء@example.org", "emailBefore"],
    ["mina@example", "emailAfter"],
    ["mina@-example.org", "emailAfter"],
    ["mina@127.0.0.1", "emailAfter"],
    ["mina@exa\nmple.org", "emailAfter"],
    ["leser@büc\ther.example", "emailAfter"],
    [`a@${"b".repeat(63)}.${"c".repeat(63)}.${"d".repeat(63)}.${"e".repeat(63)}.org`, "emailLong"],
    ["mina@example.org\r\nBcc: x@example.org", "emailAt"],
  ])("%j is refused as %s", (typed, key) => expect(ask(typed).error?.issues[0]?.message).toBe(key));

  test("one that is missing altogether is refused in words", () => {
    expect(RequestSubscriptionInput.safeParse({ locale: "ar", page: "ar" }).error?.issues[0]?.message).toBe("emailMissing");
    expect(RequestSubscriptionInput.safeParse({ email: "a@example.org", locale: "xx", page: "ar" }).error?.issues[0]?.message).toBe("languageMissing");
  });

  test("what is kept is kept again", () => {
    for (const typed of ["Mina@Example.org", "leser@bücher.example"]) {
      const kept = ask(typed).data?.email ?? "";
      expect(ask(kept).data?.email).toBe(kept);
      expect(addressFault(kept)).toBeNull();
    }
  });
});

describe("a network", () => {
  test.each([
    ["203.0.113.9", "203.0.113.9"],
    ["10.0.0.1, 203.0.113.9", "203.0.113.9"],
    ["::ffff:203.0.113.9", "203.0.113.9"],
    ["2001:db8:1:2:3:4:5:6", "2001:db8:1:2"],
    ["2001:0DB8:0001:0002::9", "2001:db8:1:2"],
    ["2001:db8::1", "2001:db8:0:0"],
    ["::1", "0:0:0:0"],
    [null, ""],
  ])("%s is %s", (header, network) => expect(networkOf(header)).toBe(network));
});
