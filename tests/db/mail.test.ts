import { runOnce } from "graphile-worker";
import { afterAll, describe, expect, test, vi } from "vitest";
import { closePool } from "@/db/client";
import { withClient } from "@/lib/commands/databases.mjs";
import { composeMail } from "@/lib/mail/compose-mail";
import { sendMail } from "@/lib/mail/send-mail";
import { requestReset } from "@/lib/services/account/request-reset";
import { invite } from "@/lib/services/team/invite";
import { listOutbox } from "@/lib/services/team/list-outbox";
import { startMailbox } from "../helpers/mailbox";
import { memberOf, newEmail, newTeam, refusalOf, someone, visitor } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

const { adminUrl, ownerUrl } = await testDatabase();
const mailbox = await startMailbox();
afterAll(async () => {
  await closePool();
  await mailbox.stop();
});
const admin = (statement: string, values: unknown[] = []) => withClient(adminUrl, (client) => client.query(statement, values));
const stored = async (email: string) => (await admin("select * from outbox where recipient = $1", [email])).rows[0];

/** Each test has settings of its own; they are read once per module graph. */
async function withSettings(settings: Record<string, string>) {
  vi.resetModules();
  Object.assign(process.env, settings);
  const [mail, client] = [await import("@/lib/mail/send-mail"), await import("@/db/client")];
  return { ...mail, ...client };
}

describe("a mail", () => {
  test("reaches the mail server once, with the words that were stored", async () => {
    const email = newEmail();
    await invite(await newTeam("Gantry crew"), { email, role: "engineer" });
    const { sendMail: send, closePool: close } = await withSettings({ SMTP_URL: mailbox.smtpUrl });
    const jobs: string[] = [];
    const taskList = {
      "send-mail": async (payload: unknown) => {
        jobs.push((payload as { outboxId: string }).outboxId);
        await send((payload as { outboxId: string }).outboxId);
      },
    };
    await runOnce({ connectionString: ownerUrl, taskList, parsedCronItems: [], noHandleSignals: true });
    const row = await stored(email);
    expect(jobs).toContain(row.id);
    const received = mailbox.mails.filter(({ to }) => to.includes(email));
    expect(received).toHaveLength(1);
    expect(received[0]).toMatchObject({
      subject: "Test Lead invites you to the team Gantry crew",
      from: "no-reply@gainwright.example",
    });
    expect(received[0].text).toContain("/invitations/");
    expect(row).toMatchObject({ attempts: 1, last_error: null, sent_at: expect.any(Date) });
    expect(await send(row.id)).toBe("nothing-to-send");
    expect(mailbox.mails.filter(({ to }) => to.includes(email))).toHaveLength(1);
    await close();
  });

  test("that a server refuses is kept with the reason, and goes out later", async () => {
    const email = newEmail();
    await invite(await newTeam(), { email, role: "engineer" });
    const { id } = await stored(email);
    const broken = await withSettings({ SMTP_URL: "smtp://127.0.0.1:1" });
    await expect(broken.sendMail(id)).rejects.toThrow();
    await broken.closePool();
    expect(await stored(email)).toMatchObject({
      attempts: 1,
      sent_at: null,
      last_error: expect.stringContaining("ECONNREFUSED"),
    });
    const mended = await withSettings({ SMTP_URL: mailbox.smtpUrl });
    expect(await mended.sendMail(id)).toBe("sent");
    await mended.closePool();
    expect(await stored(email)).toMatchObject({ attempts: 2, last_error: null });
  });

  test("stays in the outbox where no server is set", async () => {
    const email = newEmail();
    await invite(await newTeam(), { email, role: "engineer" });
    expect(await sendMail((await stored(email)).id)).toBe("kept");
    expect(await stored(email)).toMatchObject({ attempts: 0, sent_at: null });
  });

  test("is queued with the change and not without it", async () => {
    const lead = await newTeam();
    const email = newEmail();
    await admin("delete from graphile_worker._private_jobs");
    await invite(lead, { email, role: "engineer" });
    await invite({ ...lead, role: "reviewer" }, { email, role: "engineer" }).catch(() => undefined);
    const { rows } = await admin("select payload->>'outboxId' as id from graphile_worker._private_jobs");
    expect(rows).toEqual([{ id: (await stored(email)).id }]);
  });

  test("takes no second header or tag from what people wrote", () => {
    const evil = 'x\r\nBcc: all@elsewhere.example\n\n<img src=x onerror="alert(1)">\u2028&';
    const mail = composeMail({
      recipient: `a@b.example\r\nBcc: ${newEmail()}`,
      subject: evil,
      paragraphs: [evil],
      action: { label: evil, url: 'https://x.example/"onmouseover="alert(1)' },
      closing: evil,
    });
    for (const header of [mail.recipient, mail.subject]) expect(header).not.toMatch(/[\p{Cc}\p{Zl}\p{Zp}]/u);
    expect(mail.html).not.toContain("<img");
    expect(mail.html).not.toContain('"onmouseover');
    expect(mail.html).not.toMatch(/<(img|script|link|style|iframe|object)/);
  });
});

describe("the demo's page of mails", () => {
  test("does not exist outside the demo", async () => {
    expect(await refusalOf(listOutbox(await newTeam()))).toMatchObject({ code: "not-found" });
  });

  test("shows a lead the team's mails and those to its members, and nobody else's", async () => {
    const [lead, other] = [await newTeam(), await newTeam()];
    const member = await someone();
    await memberOf(lead.teamId, "reviewer", member);
    const stranger = await someone();
    const invited = newEmail();
    await invite(lead, { email: invited, role: "engineer" });
    await invite(other, { email: newEmail(), role: "engineer" });
    await requestReset(visitor(), { email: member.email });
    await requestReset(visitor(), { email: stranger.email });
    vi.resetModules();
    process.env.GAINWRIGHT_DEMO = "yes";
    const demo = await import("@/lib/services/team/list-outbox");
    const { closePool: close } = await import("@/db/client");
    const shown = await demo.listOutbox(lead);
    expect(shown.map(({ recipient }) => recipient).sort()).toEqual([invited, member.email].sort());
    expect(shown.find(({ recipient }) => recipient === invited)?.text).toContain("/invitations/");
    expect(await refusalOf(demo.listOutbox({ ...lead, role: "engineer" }))).toMatchObject({ code: "forbidden" });
    await close();
    process.env.GAINWRIGHT_DEMO = "no";
  });
});
