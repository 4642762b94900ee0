import { mkdirSync } from "node:fs";
import { join } from "node:path";
import { stopChildren } from "../../lib/commands/children.mjs";
import { prepareDatabase } from "../../lib/commands/databases.mjs";
import { loadDemoData } from "../../lib/commands/demo-data.mjs";
import { freePort } from "../../lib/commands/free-port.mjs";
import { migrateDatabase } from "../../lib/commands/migrations.mjs";
import { root } from "../../lib/commands/paths.mjs";
import { serviceEnvironment, startService } from "../../lib/commands/service.mjs";
import { startThrowAwayCluster } from "../../lib/commands/throw-away-cluster.mjs";
import { startMailbox } from "./mailbox";

const host = "127.0.0.1";

/** The production build on a throw-away database with the demo data, with its jobs and a mail server, for one Playwright run. */
export default async function browserStack() {
  const cluster = await startThrowAwayCluster();
  const mailbox = await startMailbox();
  try {
    const urls = await prepareDatabase(cluster.adminUrl, "gainwright", { owner: "owner-of-tests", app: "app-of-tests" });
    await migrateDatabase(urls.ownerUrl);
    const port = await freePort(host);
    const address = `http://localhost:${port}`;
    const logs = join(root, "dist", "browser-test-logs");
    mkdirSync(logs, { recursive: true });
    Object.assign(process.env, {
      SMTP_URL: mailbox.smtpUrl,
      MAILBOX_URL: mailbox.pageUrl,
      BASE_URL: address,
      NEXTAUTH_URL: address,
      // Each test says which address it comes from, so that limits by address which one test reaches do not reach another.
      TRUSTED_PROXIES: "1",
    });
    const service = { ...urls, address, secret: "a-secret-for-browser-tests-0123456789abcdef", demo: true };
    await loadDemoData(serviceEnvironment(service));
    await startService({ ...service, host, port }, logs);
  } catch (error) {
    await mailbox.stop();
    await stopChildren();
    throw error;
  }
  return async () => {
    await stopChildren();
    await mailbox.stop();
  };
}
