import { type AnyPgColumn, foreignKey, index } from "drizzle-orm/pg-core";
import { memberships } from "./people";

type Authored = { readonly teamId: AnyPgColumn; readonly createdBy: AnyPgColumn };

/** Whoever made a row of `name` was a member of its team then, even if no longer. */
export const authorOf = (name: string, { teamId, createdBy }: Authored) => [
  foreignKey({
    name: `${name}_author`,
    columns: [teamId, createdBy],
    foreignColumns: [memberships.teamId, memberships.userId],
  }),
  index(`${name}_author_index`).on(teamId, createdBy),
];
