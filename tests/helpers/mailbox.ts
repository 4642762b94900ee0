import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import { type AddressObject, simpleParser } from "mailparser";
import { SMTPServer } from "smtp-server";

export type ReceivedMail = {
  readonly to: string[];
  readonly from: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
};

const addresses = (found: AddressObject | AddressObject[] | undefined) =>
  (found ? [found].flat() : []).flatMap(({ value }) => value.map(({ address }) => address ?? ""));

/** A real mail server on loopback that keeps what it gets, and a page of all of it as JSON for tests in other processes. */
export async function startMailbox() {
  const mails: ReceivedMail[] = [];
  const smtp = new SMTPServer({
    disabledCommands: ["STARTTLS", "AUTH"],
    onData(stream, _session, done) {
      simpleParser(stream).then((mail) => {
        const from = addresses(mail.from)[0] ?? "";
        mails.push({ to: addresses(mail.to), from, subject: mail.subject ?? "", text: mail.text ?? "", html: mail.html || "" });
        done();
      }, done);
    },
  });
  const http = createServer((_request, response) =>
    response.setHeader("content-type", "application/json").end(JSON.stringify(mails)),
  );
  const smtpPort = await new Promise<number>((resolve) => {
    const listening = smtp.listen(0, "127.0.0.1", () => resolve((listening.address() as AddressInfo).port));
  });
  const httpPort = await new Promise<number>((resolve) => {
    http.listen(0, "127.0.0.1", () => resolve((http.address() as AddressInfo).port));
  });
  return {
    mails,
    smtpUrl: `smtp://127.0.0.1:${smtpPort}`,
    pageUrl: `http://127.0.0.1:${httpPort}`,
    stop: async () => {
      http.close();
      await new Promise<void>((resolve) => smtp.close(() => resolve()));
    },
  };
}

/** The newest mail to `address` whose subject matches, waited for: jobs send a moment after the page has answered. */
export async function waitForMail(address: string, subject: RegExp): Promise<ReceivedMail> {
  const page = process.env.MAILBOX_URL;
  if (!page) throw new Error("MAILBOX_URL is not set: the browser stack has not been started");
  for (const end = Date.now() + 15_000; Date.now() < end; ) {
    const mails = (await (await fetch(page)).json()) as ReceivedMail[];
    const found = mails.findLast((mail) => mail.to.includes(address) && subject.test(mail.subject));
    if (found) return found;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error(`no mail to ${address} with a subject like ${subject} within 15 seconds`);
}
