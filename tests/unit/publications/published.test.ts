import { describe, expect, test } from "vitest";
import type { RenderedBriefing } from "@/lib/briefings/rendered";
import { changedFigures } from "@/lib/publications/changed-figures";
import { changesOf, chooseSaid, chooseText, newestOfEach, ofSlug, type PublishedRelease } from "@/lib/publications/published";

const release = (over: Partial<PublishedRelease>): PublishedRelease => ({
  id: "r",
  briefingId: "b",
  outbreakId: "o",
  slug: "s",
  number: 1,
  kind: "first",
  publishedAt: "2027-03-02T10:00:00.000Z",
  assessmentHash: "",
  contentHash: "",
  correction: {},
  texts: [{ locale: "en", title: "T", briefingNumber: 4 }],
  events: [],
  ...over,
});

describe("which version residents see", () => {
  const first = release({ id: "r1" });
  const second = release({ id: "r2", number: 2, kind: "correction", publishedAt: "2027-03-05T10:00:00.000Z" });
  const other = release({ id: "r3", briefingId: "c", slug: "t", publishedAt: "2027-03-04T10:00:00.000Z" });

  test("the highest number of each briefing, in whatever order they come", () => {
    expect(newestOfEach([first, second, other]).map(({ id }) => id)).toEqual(["r2", "r3"]);
    expect(newestOfEach([second, other, first]).map(({ id }) => id)).toEqual(["r2", "r3"]);
  });

  test("versions of one address, newest first", () => expect(ofSlug([first, other, second], "s").map(({ id }) => id)).toEqual(["r2", "r1"]));

  test("their language, else English, else any", () => {
    const texts = [{ locale: "fr" as const, title: "F", briefingNumber: 4 }, { locale: "en" as const, title: "E", briefingNumber: 4 }];
    expect(chooseText(release({ texts }), "fr")?.title).toBe("F");
    expect(chooseText(release({ texts }), "hi")?.title).toBe("E");
    expect(chooseText(release({ texts: texts.slice(0, 1) }), "hi")?.title).toBe("F");
    expect(chooseSaid({ fr: "oui" }, "hi")).toEqual({ value: "oui", lang: "fr" });
    expect(chooseSaid({}, "hi")).toBeNull();
  });

  test("everything that happened, newest first", () => {
    const withdrawn = release({ id: "r4", events: [{ kind: "withdrawn", at: "2027-03-06T10:00:00.000Z", notice: {}, byReleaseId: null }] });
    expect(changesOf([withdrawn, second]).map(({ kind }) => kind)).toEqual(["withdrawn", "corrected", "released"]);
  });
});

test("figures that a correction changed, and only those", () => {
  const figure = (ref: string, name: string, text: string) => ({ ref, text, label: name, figure: name, package: "B", form: "value" as const });
  const version = (figures: RenderedBriefing["figures"]) => ({ figures }) as RenderedBriefing;
  const before = version([figure("F1", "deaths", "1,580"), figure("F2", "averted", "450"), figure("F3", "gone", "7")]);
  const now = version([figure("F2", "deaths", "1,620"), figure("F1", "averted", "450"), figure("F4", "deaths", "1,620"), figure("F5", "new", "3")]);
  expect(changedFigures(before, now)).toEqual([{ label: "deaths", before: "1,580", now: "1,620" }]);
});
