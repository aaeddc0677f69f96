import { afterAll, describe, expect, test } from "vitest";
import { closeDb, portalDb } from "@/db/client";
import { assessments, briefings, briefingTexts, briefingVersions, deliveries, frozenAssessments, measures, outbreaks, releases, reviews, sessions, subscriptions, users } from "@/db/schema";
import { listContents, listReleases } from "@/lib/publications/queries";

afterAll(closeDb);

const refused = async (query: Promise<unknown>) => {
  const error = await query.then(() => null, (thrown: { cause?: { code?: string } }) => thrown);
  expect(error?.cause?.code).toBe("42501");
};

describe("what the public side may read", () => {
  test("is what its own reads ask for", async () => {
    const all = await listReleases();
    expect(Array.isArray(all)).toBe(true);
    const wanted = all.flatMap((release) => release.texts.slice(0, 1).map(({ locale }) => ({ releaseId: release.id, locale })));
    const contents = await listContents(wanted);
    expect(contents.size).toBe(wanted.length);
    for (const release of all) expect(contents.get(release.id)?.slug).toBe(release.slug);
  });

  test.each([
    ["users", users],
    ["sessions", sessions],
    ["subscriptions", subscriptions],
    ["deliveries", deliveries],
    ["outbreaks", outbreaks],
    ["measures", measures],
    ["assessments", assessments],
    ["frozen assessments", frozenAssessments],
    ["briefings", briefings],
    ["texts", briefingTexts],
    ["versions", briefingVersions],
    ["reviews", reviews],
  ])("never %s", async (_, table) => refused(portalDb.select().from(table).limit(1)));

  test("never who published", async () => refused(portalDb.select({ by: releases.publishedBy }).from(releases).limit(1)));
});
