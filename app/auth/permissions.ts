/** Who may do what: the one table, asked in every loader, action and API route and mirrored in the screens. */

export const roles = ["administrator", "engineer", "integrator", "reviewer", "developer"] as const;
export type Role = (typeof roles)[number];

const everyone = roles;

const table = {
  read: everyone,
  "model.edit": ["administrator", "engineer"],
  "mapping.edit": ["administrator", "engineer", "integrator"],
  "revision.freeze": ["administrator", "engineer", "integrator"],
  comment: everyone,
  "review.decide": ["administrator", "engineer", "integrator", "reviewer"],
  release: ["administrator", "engineer", "reviewer"],
  "test-server.run": everyone,
  "test-server.write": ["administrator", "engineer", "integrator", "developer"],
  "endpoint.write": ["administrator", "integrator"],
  "as-built.record": ["administrator", "engineer", "integrator", "reviewer"],
  "organization.administer": ["administrator"],
} as const satisfies Record<string, readonly Role[]>;

export type Action = keyof typeof table;

export const actions = Object.keys(table) as readonly Action[];

/** Whether somebody with these roles may do it; one of several roles is enough. */
export function can(held: readonly Role[], action: Action): boolean {
  const allowed: readonly Role[] = table[action];
  return held.some((role) => allowed.includes(role));
}

/** All that somebody with these roles may do, for screens. */
export function listPermissions(held: readonly Role[]): Action[] {
  return actions.filter((action) => can(held, action));
}

export function isRole(text: string): text is Role {
  return (roles as readonly string[]).includes(text);
}

/** Reads the stored form, roles separated by commas; an unknown word gives no rights. */
export function parseRoles(text: string): Role[] {
  return text
    .split(",")
    .map((word) => word.trim())
    .filter(isRole);
}

export function formatRoles(held: readonly Role[]): string {
  return roles.filter((role) => held.includes(role)).join(",");
}

/** What a token may do within its owner's roles; each scope stands by itself. */
export const tokenScopes = ["read", "write", "review", "release"] as const;
export type TokenScope = (typeof tokenScopes)[number];

/** The scope that an action asks of a token. */
export function getScope(action: Action): TokenScope {
  switch (action) {
    case "read":
    case "release":
      return action;
    case "comment":
    case "review.decide":
      return "review";
    default:
      return "write";
  }
}
