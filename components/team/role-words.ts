import type { Role } from "@/lib/schemas/team";

/** What each role may do, in one sentence each; lib/permissions decides. */
export const ROLES: readonly { readonly role: Role; readonly may: string }[] = [
  { role: "lead", may: "everything: plants, designs, templates, members" },
  { role: "engineer", may: "enters plants, makes designs, starts from templates" },
  { role: "reviewer", may: "reads all, computes, compares and keeps comparisons" },
];

export const ROLE_OPTIONS = ROLES.map(({ role }) => ({ value: role, label: role }));

export const roleOf = (text: string): Role => ROLES.find(({ role }) => role === text)?.role ?? "reviewer";

/** "an engineer", "a lead" */
export const asRole = (role: Role) => `${role === "engineer" ? "an" : "a"} ${role}`;
