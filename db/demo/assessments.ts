import { createAssessment } from "../../lib/assessments/create-assessment";
import { freezeAssessment } from "../../lib/assessments/freeze-assessment";
import { closeCompute } from "../../lib/compute/assess-off-thread";
import type { StaffCtx } from "../../lib/context";

const SETTINGS = { draws: 2000, seed: 20270301, horizonDays: 365 };

/** One assessment over A, B and C, frozen, and one in work over A and B. Expects the outbreak with its three packages. */
export async function seedAssessments(ctx: StaffCtx, outbreakId: string): Promise<{ frozenId: string; workingId: string }> {
  const frozen = await createAssessment(ctx, { outbreakId, title: "Three packages against no further measures", packageLetters: ["A", "B", "C"], ...SETTINGS });
  await freezeAssessment(ctx, { id: frozen.id, version: 1, reason: "The council decides between the three packages on Tuesday; the briefing needs figures that stay." });
  const working = await createAssessment(ctx, { outbreakId, title: "Light or evening closure, looked at again", packageLetters: ["A", "B"], ...SETTINGS });
  // Threads would keep a program that only seeds from ending.
  await closeCompute();
  return { frozenId: frozen.id, workingId: working.id };
}
