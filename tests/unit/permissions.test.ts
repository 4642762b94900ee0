import { describe, expect, test } from "vitest";
import { type Asker, allow, isAllowed } from "@/lib/permissions/allow";
import { RIGHTS, type Right } from "@/lib/permissions/rights";

const all: Right[] = Object.keys(RIGHTS).filter((name): name is Right => name in RIGHTS);
const reading: Right[] = [
  "plant:read",
  "design:read",
  "comparison:read",
  "template:read",
  "team:read",
  "audit:read",
  "compute:use",
];
const own: Right[] = ["token:own", "account:own"];

/** Written out by hand, apart from the table it is held against. */
const expected: Record<Asker["role"], Right[]> = {
  reviewer: [...reading, ...own, "comparison:write"],
  engineer: [...reading, ...own, "comparison:write", "plant:write", "design:write", "template:use"],
  lead: all,
};
const roles: Asker["role"][] = ["lead", "engineer", "reviewer"];

describe.each(roles)("a %s", (role) => {
  test("may at a page what the role may, and nothing else", () => {
    expect(all.filter((right) => isAllowed({ role, scope: "write" }, right)).sort()).toEqual([...expected[role]].sort());
  });

  test("with a write token may do the same, but manage no team, tokens, account or mail", () => {
    const inPerson: Right[] = ["team:manage", "token:own", "account:own", "outbox:read"];
    const wanted = expected[role].filter((right) => !inPerson.includes(right));
    expect(all.filter((right) => isAllowed({ role, scope: "write", tokenId: "t" }, right)).sort()).toEqual(wanted.sort());
  });

  test("with a read token may only read and compute", () => {
    expect(all.filter((right) => isAllowed({ role, scope: "read", tokenId: "t" }, right)).sort()).toEqual([...reading].sort());
  });
});

test("a refusal says which role or scope is missing, and is a forbidden", () => {
  const refusal = (asker: Asker, right: Right) => {
    try {
      allow(asker, right);
    } catch (error) {
      return error;
    }
    return undefined;
  };
  expect(refusal({ role: "reviewer", scope: "write" }, "plant:write")).toMatchObject({
    code: "forbidden",
    message: "This needs the role lead or engineer; yours is reviewer.",
  });
  expect(refusal({ role: "lead", scope: "read", tokenId: "t" }, "plant:write")).toMatchObject({
    code: "forbidden",
    message: /scope/,
  });
  expect(refusal({ role: "lead", scope: "write", tokenId: "t" }, "team:manage")).toMatchObject({
    code: "forbidden",
    message: /page/,
  });
  expect(refusal({ role: "lead", scope: "write" }, "team:manage")).toBeUndefined();
});

test("a right or a role that is in no table is refused", () => {
  expect(isAllowed({ role: "lead", scope: "write" }, "constructor" as Right)).toBe(false);
  expect(isAllowed({ role: "lead", scope: "write" }, "plant:destroy" as Right)).toBe(false);
  expect(isAllowed({ role: "owner" as Asker["role"], scope: "write" }, "plant:read")).toBe(false);
  expect(isAllowed({ role: "lead", scope: "all" as Asker["scope"] }, "plant:read")).toBe(false);
});
