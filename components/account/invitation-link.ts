const LINK = /(?:^|\/invitations\/)([A-Za-z0-9_-]{43})(?:$|[?#/])/;

/** The secret of an invitation, from its link as pasted or from the secret alone; null where there is none. */
export function invitationSecret(pasted: string): string | null {
  const [, secret] = LINK.exec(pasted.replace(/\s+/g, "")) ?? [];
  return secret ?? null;
}
