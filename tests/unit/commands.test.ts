import { spawn, spawnSync } from "node:child_process";
import { existsSync, mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, expect, test } from "vitest";
import { lastLines, runChild, startChild } from "@/lib/commands/children.mjs";
import { freePort } from "@/lib/commands/free-port.mjs";
import { root } from "@/lib/commands/paths.mjs";
import { claim } from "@/lib/commands/run-lock.mjs";
import { secrets } from "@/lib/commands/secrets.mjs";

const folder = mkdtempSync(join(tmpdir(), "commands-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

test("a port that is taken is passed over", async () => {
  const server = createServer();
  const taken = await new Promise<number>((resolve) => {
    server.listen(0, "127.0.0.1", () => {
      const address = server.address();
      resolve(typeof address === "object" && address ? address.port : 0);
    });
  });
  const port = await freePort("127.0.0.1", taken);
  expect(port).not.toBe(taken);
  expect(port).toBeGreaterThan(1023);
  await new Promise((resolve) => server.close(resolve));
  expect(await freePort("127.0.0.1", taken)).toBe(taken);
});

test("secrets are made once, long, different, and readable by their owner alone", () => {
  const made = secrets(folder);
  expect(secrets(folder)).toEqual(made);
  expect(new Set(Object.values(made)).size).toBe(4);
  for (const secret of Object.values(made)) expect(secret).toMatch(/^[0-9a-f]{64}$/);
  expect(statSync(join(folder, "secrets.json")).mode & 0o777).toBe(0o600);
});

test("a second run on the same data is refused while the first lives, and only then", () => {
  const file = join(folder, "running.json");
  claim(folder).announce("http://localhost:3000");
  expect(() => claim(folder)).toThrow("already running at http://localhost:3000");
  // The number of a process that began at another time is not the run of then.
  writeFileSync(file, JSON.stringify({ ...JSON.parse(readFileSync(file, "utf8")), started: "1" }));
  expect(() => claim(folder)).not.toThrow();
});

test("a child is stopped by its signal, and by force when it does not listen", async () => {
  const polite = startChild("sleep", ["60"], { name: "sleep" });
  await polite.stop();
  expect(polite.hasExited()).toBe(true);
  const log = join(folder, "deaf.log");
  const deaf = startChild("sh", ["-c", 'trap "" TERM; echo ready; while :; do sleep 0.05; done'], {
    name: "sh",
    log,
    patience: 100,
  });
  await expect.poll(() => lastLines(deaf)).toBe("ready");
  await deaf.stop();
  expect(deaf.hasExited()).toBe(true);
});

test("a child that outlives its time is stopped and reported as late", async () => {
  expect((await runChild("sleep", ["60"], { name: "sleep", seconds: 0.2 })).code).toBe(124);
  expect((await runChild("sh", ["-c", "exit 3"], { name: "sh", seconds: 10 })).code).toBe(3);
  expect((await runChild(join(folder, "absent"), [], { name: "nothing", seconds: 10 })).code).not.toBe(0);
});

/** A parent that starts a child and is killed outright. */
test.runIf(existsSync("/usr/bin/setpriv"))("a child ends when its parent is killed outright", async () => {
  const pidFile = join(folder, "child.pid");
  const code = `
    import { startChild } from ${JSON.stringify(join(root, "lib/commands/children.mjs"))};
    startChild("sh", ["-c", "echo $$ > ${pidFile}; exec sleep 60"], { name: "sleep" });
  `;
  const parent = spawn(process.execPath, ["--input-type=module", "-e", code]);
  await expect.poll(() => existsSync(pidFile) && readFileSync(pidFile, "utf8").trim(), { timeout: 10_000 }).toMatch(/^\d+$/);
  const pid = Number(readFileSync(pidFile, "utf8"));
  parent.kill("SIGKILL");
  await expect.poll(() => spawnSync("kill", ["-0", String(pid)]).status, { timeout: 5_000 }).not.toBe(0);
});
