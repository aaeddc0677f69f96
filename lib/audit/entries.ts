/** What the register records: one action, its subject, and the hash of the exact content where there is one. */
export const AUDIT_ACTIONS = [
  "user.invite",
  "user.changeRole",
  "user.deactivate",
  "user.signIn",
  "user.signOut",
  "outbreak.create",
  "outbreak.update",
  "measure.create",
  "measure.update",
  "package.create",
  "package.update",
  "package.delete",
  "assessment.create",
  "assessment.update",
  "assessment.freeze",
  "briefing.create",
  "briefing.update",
  "briefing.translate",
  "briefing.submit",
  "briefing.return",
  "briefing.sign",
  "briefing.void",
  "briefing.publish",
  "briefing.withdraw",
  "briefing.correct",
  "subscription.request",
  "subscription.confirm",
  "subscription.change",
  "subscription.leave",
  "subscription.erase",
  "settings.update",
] as const;
export type AuditAction = (typeof AUDIT_ACTIONS)[number];

export type AuditEntry = {
  action: AuditAction;
  /** `table/id`, for example `briefing/9f…`. Never personal data: subscribers appear as a pseudonym. */
  subject: string;
  /** SHA-256 (hex) of the frozen content that the act binds. */
  objectHash?: string;
  reason?: string;
  /** Flat facts: strings, or integers below 2^53. No personal data. */
  facts?: Record<string, string | number>;
};
