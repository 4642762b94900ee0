import "./node-version.mjs";
import { startChild } from "./children.mjs";
import { runCommand } from "./command.mjs";
import { ensurePackages } from "./packages.mjs";
import { root, script, stateFolder } from "./paths.mjs";

/** Pages that follow the sources, on a private database of their own beside that of `npm start`. */
async function develop() {
  ensurePackages({ development: true });
  const [{ openPrivateDatabase }, { freePort }, { loadDemoData }, { claim }, { secrets }, service] = await Promise.all([
    import("./private-database.mjs"),
    import("./free-port.mjs"),
    import("./demo-data.mjs"),
    import("./run-lock.mjs"),
    import("./secrets.mjs"),
    import("./service.mjs"),
  ]);
  const state = stateFolder("dev");
  const lock = claim(state);
  const keys = secrets(state);
  const host = process.env.HOST || "127.0.0.1";
  const port = await freePort(host, Number(process.env.PORT || 3100));
  const address = `http://localhost:${port}`;
  const common = { address, secret: keys.auth, demo: true };
  const { child, ...urls } = await openPrivateDatabase(state, keys, (made) =>
    loadDemoData(service.serviceEnvironment({ ...made, ...common })),
  );
  const env = service.serviceEnvironment({ ...urls, ...common }, "development");
  const worker = service.startWorker({ ...urls, ...common });
  const args = [script("next", "dist/bin/next"), "dev", "--hostname", host, "--port", String(port)];
  const web = startChild(process.execPath, args, { name: "The web server", env, cwd: root });
  await service.untilHealthy([web, worker], `http://127.0.0.1:${port}`);
  lock.announce(address);
  console.log(`\n  ${address}\n  psql "${urls.ownerUrl}"\n`);
  await Promise.race([web.exited, worker.exited, child.exited]);
  return 1;
}

await runCommand(develop, { interrupted: 0 });
