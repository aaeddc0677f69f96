import type { Level } from "@/components/ui/marks";
import type { BriefingState } from "@/lib/briefings/constants";

const LEVEL: Record<BriefingState, Level> = {
  draft: "started", figureCheck: "half", legalReview: "half", changesAsked: "returned", approved: "most", scheduled: "most",
  published: "full", underCorrection: "returned", reviewDue: "most", withdrawn: "withdrawn", archived: "withdrawn",
};
export const levelOf = (state: BriefingState): Level => LEVEL[state];
