import { expect, test } from "vitest";
import { invitationSecret } from "@/components/account/invitation-link";

const secret = `${"Ab3_".repeat(10)}xy-`;

test("a whole invitation link gives its secret, however it was pasted", () => {
  const link = `https://gains.example/invitations/${secret}`;
  for (const pasted of [link, ` ${link}\n`, `${link}?from=mail`, `${link}#top`, `${link}/`, secret, `/invitations/${secret}`]) {
    expect(invitationSecret(pasted)).toBe(secret);
  }
  expect(invitationSecret(`${link.slice(0, 40)}\n${link.slice(40)}`)).toBe(secret);
});

test("a link cut short, too long or to elsewhere gives none", () => {
  for (const pasted of ["", "hello", secret.slice(1), `${secret}x`, `https://gains.example/reset-password/${secret}`]) {
    expect(invitationSecret(pasted)).toBeNull();
  }
});
