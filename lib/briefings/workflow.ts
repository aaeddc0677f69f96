import type { BriefingState } from "./constants";

/** Every step of the publication state machine: where it may start and where it ends. */
export const STEPS = {
  edit: { from: ["draft", "changesAsked", "legalReview", "approved", "underCorrection"], to: "draft" },
  submit: { from: ["draft", "underCorrection"], to: "legalReview" },
  return: { from: ["legalReview"], to: "changesAsked" },
  sign: { from: ["legalReview"], to: "approved" },
  publish: { from: ["approved"], to: "published" },
  update: { from: ["published", "reviewDue"], to: "draft" },
  correct: { from: ["published", "reviewDue"], to: "underCorrection" },
  withdraw: { from: ["published", "reviewDue", "underCorrection", "draft", "legalReview", "changesAsked", "approved"], to: "withdrawn" },
} as const satisfies Record<string, { from: readonly BriefingState[]; to: BriefingState }>;

export type Step = keyof typeof STEPS;

/** What decides whether a step may be taken; reasons come back as keys, all of them at once. */
export type StepFacts = {
  state: BriefingState;
  /** The person who would take the step. */
  actorId: string;
  /** Everyone who wrote or translated any of it since the last release. */
  authors: readonly string[];
  /** Findings that stop, over all languages. */
  stops: number;
  reviewDate: string | null;
  /** False where the package goes against structured law. */
  deliverable: boolean;
  /** Languages in which a measure of the package has no words for residents. */
  localesWithoutMeasures: readonly string[];
  /** Languages in which a correction doesn't say yet what was wrong and what it changes. */
  localesWithoutNote: readonly string[];
  /** The signature on the present version, where one stands. */
  signature: { reviewer: string } | null;
  /** Whether residents can read a release of it. */
  released: boolean;
};

const REASONS: Record<Step, (facts: StepFacts) => string[]> = {
  edit: () => [],
  submit: ({ stops, reviewDate, deliverable, localesWithoutMeasures, localesWithoutNote }) => [
    ...(stops > 0 ? ["findingsOpen"] : []),
    ...(reviewDate === null ? ["reviewDateMissing"] : []),
    ...(deliverable ? [] : ["notDeliverable"]),
    ...(localesWithoutMeasures.length > 0 ? ["measureWordsMissing"] : []),
    ...(localesWithoutNote.length > 0 ? ["correctionNoteMissing"] : []),
  ],
  return: ({ authors, actorId }) => (authors.includes(actorId) ? ["ownWork"] : []),
  sign: ({ authors, actorId }) => (authors.includes(actorId) ? ["ownWork"] : []),
  publish: ({ signature, actorId }) => (signature === null ? ["noSignature"] : signature.reviewer === actorId ? ["signerPublishes"] : []),
  update: () => [],
  correct: () => [],
  withdraw: ({ released }) => (released ? [] : ["neverReleased"]),
};

/** All reasons against a step; none means that it may be taken. Commands refuse with them, pages show them. */
export function reasonsAgainst(step: Step, facts: StepFacts): string[] {
  const from: readonly BriefingState[] = STEPS[step].from;
  return [...(from.includes(facts.state) ? [] : [`wrongState.${facts.state}`]), ...REASONS[step](facts)];
}
