/** Refusals that a person can do something about; everything else is a bug and is thrown as it is. */
export const DOMAIN_ERROR_CODES = [
  "notFound",
  "forbidden",
  "signedOut",
  "conflict",
  "frozen",
  "notConverged",
  "notReady",
  "wrongState",
  "ownWork",
  "tooMany",
  "expired",
  "invalid",
] as const;
export type DomainErrorCode = (typeof DOMAIN_ERROR_CODES)[number];

export class DomainError extends Error {
  override readonly name = "DomainError";
  constructor(
    readonly code: DomainErrorCode,
    /** Machine-readable detail: reasons against a step, the current version at a conflict, a field path. */
    readonly detail: { reasons?: string[]; [key: string]: unknown } = {},
  ) {
    super(code);
  }
}
