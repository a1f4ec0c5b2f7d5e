import { z } from "zod";

/** The roles of a team, each of which may do all that those before it may. */
export const Role = z.enum(["viewer", "operator", "engineer", "lead"]);
export type Role = z.infer<typeof Role>;

/** What an endpoint or a button asks for. */
export type Permission = "read" | "operate" | "edit" | "approve" | "manage-members";

/**
 * Who may do what; the server enforces this table for every endpoint and the client hides what it forbids.
 *
 * - `read`: see everything of the team, and manage one's own session
 * - `operate`: upload, tune with approved profile versions, acknowledge cautions, download
 * - `edit`: write machines, polymers and profiles; tune with any version (the tuning is then trial-only)
 * - `approve`: approve profile versions
 * - `manage-members`: add people to the team
 */
const PERMISSIONS: Record<Role, readonly Permission[]> = {
  viewer: ["read"],
  operator: ["read", "operate"],
  engineer: ["read", "operate", "edit"],
  lead: ["read", "operate", "edit", "approve", "manage-members"],
};

export function may(role: Role, permission: Permission): boolean {
  return PERMISSIONS[role].includes(permission);
}

/** Roles that hold a permission, the least one first: for messages that say whom to ask. */
export function rolesThatMay(permission: Permission): Role[] {
  return Role.options.filter((role) => may(role, permission));
}
