import type { TestProject } from "vitest/node";
import { prepareDatabase } from "@/lib/commands/databases.mjs";
import { startThrowAwayCluster } from "@/lib/commands/throw-away-cluster.mjs";

export type TestCluster = {
  readonly adminUrl: string;
  readonly template: string;
  readonly passwords: { owner: string; app: string };
};

declare module "vitest" {
  export interface ProvidedContext {
    cluster: TestCluster;
  }
}

const template = "gainwright_template";
const passwords = { owner: "owner-of-tests", app: "app-of-tests" };
// Each project with a database runs this file in a module graph of its own; the environment is what they share.
const shared = "GAINWRIGHT_TEST_CLUSTER";

/** One migrated template database for the whole run, on a throw-away cluster that ends with it. */
export default async function setup(project: TestProject) {
  const running = process.env[shared];
  if (running) {
    project.provide("cluster", { adminUrl: running, template, passwords });
    return undefined;
  }
  const cluster = await startThrowAwayCluster();
  try {
    const { ownerUrl } = await prepareDatabase(cluster.adminUrl, template, passwords);
    const { migrate } = await import("@/db/migrate");
    await migrate(ownerUrl);
  } catch (error) {
    await cluster.stop();
    throw error;
  }
  process.env[shared] = cluster.adminUrl;
  project.provide("cluster", { adminUrl: cluster.adminUrl, template, passwords });
  return () => {
    delete process.env[shared];
    return cluster.stop();
  };
}
