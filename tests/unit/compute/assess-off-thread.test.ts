import { readFileSync } from "node:fs";
import { afterAll, describe, expect, test } from "vitest";
import { assessOffThread, closeCompute } from "@/lib/compute/assess-off-thread";
import { assess, canonicalJson } from "@/lib/engine";
import type { AssessmentInput } from "@/lib/engine/types";

afterAll(closeCompute);
const kelmaren = JSON.parse(readFileSync(new URL("../../../db/demo/kelmaren.json", import.meta.url), "utf8")) as AssessmentInput;
const input = { ...kelmaren, uncertainty: { draws: 200, seed: 7 } };
/** Long enough that only stopping it ends it in time. */
const endless = { ...kelmaren, uncertainty: { draws: 1_000_000, seed: 7 } };
const outcome = (work: Promise<unknown>) => work.then(() => "done", (error: { code?: string }) => error.code ?? String(error));

describe("assessOffThread", { timeout: 60_000 }, () => {
  test("gives what the engine gives, to the byte, and tells how far it is", async () => {
    const shares: number[] = [];
    const result = await assessOffThread(input, { onProgress: (share) => shares.push(share) });
    expect(canonicalJson(result)).toBe(canonicalJson(assess(input)));
    expect(shares.length).toBeGreaterThan(1);
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    expect(shares.at(-1)).toBe(1);
  });

  test("a refusal names the field and what is allowed", async () => {
    await expect(assessOffThread({ ...input, horizonDays: 0 })).rejects.toMatchObject({ code: "refused", faults: [{ path: "horizonDays", message: expect.stringContaining("at least 1") }] });
  });

  test("stops when withdrawn, and the next one runs", async () => {
    const stop = new AbortController();
    const running = outcome(assessOffThread(endless, { signal: stop.signal, onProgress: (share) => share > 0 && stop.abort() }));
    expect(await running).toBe("cancelled");
    expect(await outcome(assessOffThread(input))).toBe("done");
  });

  test("withdrawn before it began, nothing starts", async () => expect(await outcome(assessOffThread(endless, { signal: AbortSignal.abort() }))).toBe("cancelled"));

  test("stops at its time limit", async () => expect(await outcome(assessOffThread(endless, { timeLimitMs: 300 }))).toBe("timeLimit"));

  test("turns away what would wait too long, and takes work again when the queue has emptied", async () => {
    const stop = new AbortController();
    const all = Array.from({ length: 13 }, () => outcome(assessOffThread(endless, { signal: stop.signal })));
    expect(await all[12]).toBe("busy");
    stop.abort();
    expect((await Promise.all(all.slice(0, 12))).every((each) => each === "cancelled")).toBe(true);
    expect(await outcome(assessOffThread(input))).toBe("done");
  });
});
