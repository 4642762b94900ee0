import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { AUDIT_PHRASES, auditHref, auditWords } from "@/components/team/audit-words";

const KIND = /"((?:plant|design|comparison|template|team|member|invitation|token)\.[a-z-]+)"/g;

/** Every kind of event that the services write. */
function recordedKinds(): string[] {
  const folder = join(process.cwd(), "lib", "services");
  const files = readdirSync(folder, { recursive: true, encoding: "utf8" }).filter((name) => name.endsWith(".ts"));
  const found = files.flatMap((name) => [...readFileSync(join(folder, name), "utf8").matchAll(KIND)].map(([, kind]) => kind));
  return [...new Set(found)].sort();
}

const event = {
  id: "1",
  at: "2026-01-01T00:00:00.000Z",
  actor: "Mara",
  requestId: "r",
  revision: null,
  subjectName: null,
  plantId: null,
  data: {},
};

test("every kind of event that a service records has its words, and no word is for a kind that none records", () => {
  expect(recordedKinds().length).toBeGreaterThan(20);
  expect(Object.keys(AUDIT_PHRASES).sort()).toEqual(recordedKinds());
});

test("an event reads as a sentence about its actor, with what it was about", () => {
  const said = (kind: string, subjectName: string | null, data = {}) => {
    const { did, subject, more } = auditWords({ kind, subjectName, data });
    return [did, subject, more].filter(Boolean).join(" ");
  };
  expect(said("plant.revised", "Gantry")).toBe("saved a new revision of the plant Gantry");
  expect(said("member.role-changed", "Jonas", { from: "engineer", to: "lead" })).toBe(
    "changed the role of Jonas from engineer to lead",
  );
  expect(said("member.joined", "Ines", { role: "reviewer" })).toBe("joined the team as reviewer");
  expect(said("token.created", null, { name: "Script", scope: "read" })).toBe("made an access token “Script”, scope read");
});

test("a kind of a later release, or one named like a part of every object, is shown as it is written", () => {
  expect(auditWords({ kind: "review.asked-for", subjectName: "Quiet beam", data: {} }).did).toBe("review asked for");
  expect(auditWords({ kind: "constructor", subjectName: null, data: {} }).did).toBe("constructor");
});

test("data that is not what was expected is left out rather than shown", () => {
  expect(auditWords({ kind: "team.renamed", subjectName: null, data: { name: { toString: "x" } } }).more).toBe("to ");
});

test("plants, designs and templates can be gone to, the rest has no page", () => {
  const at = (subjectType: string, subjectId: string | null, plantId: string | null = null) =>
    auditHref({ ...event, kind: "x.y", subjectType, subjectId, plantId });
  expect(at("plant", "p1", "p1")).toBe("/plants/p1");
  expect(at("design", "d1", "p1")).toBe("/plants/p1/designs/d1");
  expect(at("template", "t1")).toBe("/templates/t1");
  expect(at("member", "u1")).toBeNull();
  expect(at("plant", null)).toBeNull();
});
