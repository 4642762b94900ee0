import type { AuditEvent } from "@/lib/schemas/team";

type Data = AuditEvent["data"];
/** What was done, up to the subject's name; and what stands after it. */
type Phrase = { readonly did: string; readonly more?: (data: Data) => string };

const text = (value: unknown) => (typeof value === "string" ? value : "");

/** One entry for each kind that a service records; a test walks the services. */
export const AUDIT_PHRASES: Readonly<Record<string, Phrase>> = {
  "plant.created": { did: "entered the plant" },
  "plant.revised": { did: "saved a new revision of the plant" },
  "plant.renamed": { did: "renamed the plant, now" },
  "plant.criteria-set": { did: "set the acceptance criteria of the plant" },
  "plant.archived": { did: "archived the plant" },
  "plant.restored": { did: "brought back the plant" },
  "design.created": { did: "made the design" },
  "design.revised": { did: "saved a new revision of the design" },
  "design.renamed": { did: "renamed the design, now" },
  "design.archived": { did: "archived the design" },
  "design.restored": { did: "brought back the design" },
  "comparison.saved": { did: "kept the comparison" },
  "comparison.archived": { did: "archived the comparison" },
  "template.published": { did: "published the template" },
  "template.archived": { did: "archived the template" },
  "template.restored": { did: "brought back the template" },
  "team.started": { did: "started the team" },
  "team.renamed": { did: "renamed the team", more: ({ name }) => `to ${text(name)}` },
  "member.joined": { did: "joined the team", more: ({ role }) => `as ${text(role)}` },
  "member.left": { did: "left the team" },
  "member.removed": { did: "removed the member" },
  "member.role-changed": { did: "changed the role of", more: ({ from, to }) => `from ${text(from)} to ${text(to)}` },
  "invitation.sent": { did: "sent an invitation", more: ({ role }) => `as ${text(role)}` },
  "invitation.withdrawn": { did: "withdrew an invitation" },
  "token.created": { did: "made an access token", more: ({ name, scope }) => `“${text(name)}”, scope ${text(scope)}` },
  "token.revoked": { did: "revoked an access token", more: ({ name }) => `“${text(name)}”` },
};

/** Those whose subject is the actor: the name would stand there twice. */
const OWN = new Set(["member.joined", "member.left"]);

export type AuditWords = { readonly did: string; readonly subject: string | null; readonly more: string };

/** An event as a sentence about its actor. A kind from a later release is shown as it is written. */
export function auditWords({ kind, subjectName, data }: Pick<AuditEvent, "kind" | "subjectName" | "data">): AuditWords {
  const { did, more } = Object.hasOwn(AUDIT_PHRASES, kind) ? AUDIT_PHRASES[kind] : { did: kind.replaceAll(/[.-]/g, " ") };
  return { did, subject: OWN.has(kind) ? null : subjectName, more: more?.(data) ?? "" };
}

/** Where the subject can be looked at; null where it has no page. */
export function auditHref({ subjectType, subjectId, plantId }: AuditEvent): string | null {
  if (!subjectId) return null;
  if (subjectType === "plant") return `/plants/${subjectId}`;
  if (subjectType === "design" && plantId) return `/plants/${plantId}/designs/${subjectId}`;
  return subjectType === "template" ? `/templates/${subjectId}` : null;
}
