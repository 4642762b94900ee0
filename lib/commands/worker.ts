import { Logger, type LogLevel, parseCronItems, run } from "graphile-worker";
import { z } from "zod";
import { closePool } from "@/db/client";
import { env } from "@/lib/env";
import { log } from "@/lib/log";
import { sendMail } from "@/lib/mail/send-mail";
import { sweep } from "@/lib/services/upkeep/sweep";

const MailJob = z.object({ outboxId: z.uuid() });
/** At night, in UTC; made up for at the next start where nothing ran at that hour. */
const DAILY = [{ task: "sweep", match: "17 3 * * *", options: { backfillPeriod: 24 * 3_600_000, jobKey: "sweep" } }];

/** The queue belongs to the owner, so it is run with the owner's rights; what a job does goes through the app role. */
async function work(): Promise<void> {
  const { DATABASE_OWNER_URL } = env();
  if (!DATABASE_OWNER_URL) throw new Error("Settings: DATABASE_OWNER_URL is needed to run jobs");
  const runner = await run({
    connectionString: DATABASE_OWNER_URL,
    concurrency: 4,
    pollInterval: 2_000,
    noHandleSignals: true,
    parsedCronItems: parseCronItems(DAILY),
    logger: new Logger(() => write),
    taskList: {
      "send-mail": async (payload) => {
        await sendMail(MailJob.parse(payload).outboxId);
      },
      sweep: async () => {
        log.info(await sweep(), "swept");
      },
    },
  });
  let stopping = false;
  const stop = () => {
    if (stopping) return;
    stopping = true;
    runner.stop().catch((error: unknown) => log.error({ err: error }, "the job worker did not stop cleanly"));
  };
  process.once("SIGTERM", stop);
  process.once("SIGINT", stop);
  await runner.promise;
  await closePool();
}

function write(level: `${LogLevel}`, message: string): void {
  if (level === "error") log.error(message);
  else if (level === "warning") log.warn(message);
  else log.debug(message);
}

await work();
