import "./node-version.mjs";
import { runCommand } from "./command.mjs";

/** Matrices that make up one plant with its weights and gains. */
const MATRICES = 11;

await runCommand(
  async () => {
    const { watchFuzz } = await import("./fuzz/watch-fuzz.mjs");
    const [matrices, from, threads] = ["1000000", "1", "2"].map((standard, k) => Number(process.argv[2 + k] ?? standard));
    const cases = Math.ceil(matrices / MATRICES);
    console.log(`${cases} plants of ${MATRICES} matrices each from seed ${from} on, in ${threads} threads …`);
    const { findings, answered, refused, slowest } = await watchFuzz({
      from,
      cases,
      threads,
      onStretch: (done, found) => {
        for (const { seed, call, problem } of found) console.log(`seed ${seed}, ${call}: ${problem}`);
        if (done % 1_000 === 0) console.log(`  ${done} plants`);
      },
    });
    const time = (/** @type {{ ms: number, seed: number }} */ { ms, seed }) => `${ms.toFixed(1)} (${seed})`.padStart(18);
    console.log(`${"".padEnd(24)}  answered   refused   longest call in ms, with its seed, up to 4, 8 and 20 states`);
    for (const [name, sizes] of Object.entries(slowest)) {
      const counts = [answered, refused].map((count) => String(count[name] ?? 0).padStart(9));
      console.log(`${name.padEnd(24)} ${counts.join(" ")}   ${sizes.map(time).join("")}`);
    }
    console.log(findings.length === 0 ? "Nothing found." : `${findings.length} findings.`);
    return findings.length === 0 ? 0 : 1;
  },
  { interrupted: 130 },
);
