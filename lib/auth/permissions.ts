/** Who may do what. Pages, actions and commands ask for a permission, never for a role. */
export const ROLES = ["adviser", "communications", "legal", "administrator"] as const;
export type Role = (typeof ROLES)[number];

export const PERMISSIONS = [
  "desk:read",
  "outbreak:write",
  "measure:write",
  "package:write",
  "assessment:write",
  "assessment:freeze",
  "briefing:write",
  "briefing:submit",
  "briefing:review",
  "briefing:publish",
  "briefing:withdraw",
  "register:read",
  "delivery:read",
  "user:manage",
  "settings:write",
] as const;
export type Permission = (typeof PERMISSIONS)[number];

export const PERMISSIONS_OF = {
  adviser: ["desk:read", "outbreak:write", "measure:write", "package:write", "assessment:write", "assessment:freeze", "register:read"],
  communications: ["desk:read", "briefing:write", "briefing:submit", "briefing:publish", "briefing:withdraw", "register:read", "delivery:read"],
  legal: ["desk:read", "briefing:review", "briefing:withdraw", "register:read"],
  administrator: ["desk:read", "measure:write", "register:read", "delivery:read", "user:manage", "settings:write"],
} as const satisfies Record<Role, readonly Permission[]>;

export function can(role: Role, permission: Permission): boolean {
  return (PERMISSIONS_OF[role] as readonly Permission[]).includes(permission);
}
