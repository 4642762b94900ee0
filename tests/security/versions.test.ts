import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { root } from "@/lib/commands/paths.mjs";

type Entry = {
  readonly version?: string;
  readonly resolved?: string;
  readonly integrity?: string;
  readonly link?: boolean;
  readonly inBundle?: boolean;
  readonly hasInstallScript?: boolean;
  readonly dependencies?: Readonly<Record<string, string>>;
  readonly devDependencies?: Readonly<Record<string, string>>;
};
const read = (file: string) => JSON.parse(readFileSync(join(root, file), "utf8"));
const manifest: Entry & { readonly allowScripts?: Readonly<Record<string, boolean>> } = read("package.json");
const lock: { readonly lockfileVersion: number; readonly packages: Readonly<Record<string, Entry>> } = read("package-lock.json");
const locked = Object.entries(lock.packages).filter(([path]) => path !== "");
const wanted = { ...manifest.dependencies, ...manifest.devDependencies };
const nameOf = (path: string) => path.slice(path.lastIndexOf("node_modules/") + "node_modules/".length);

/** Every installed copy, those inside other packages included. */
const versionsOf = (name: string) => locked.filter(([path]) => nameOf(path) === name).map(([, { version }]) => version ?? "");
const isAtLeast = (version: string, least: string) =>
  version.localeCompare(least, "en", { numeric: true, sensitivity: "base" }) >= 0;

test("versions are compared by their numbers", () => {
  expect([isAtLeast("16.0.7", "16.0.7"), isAtLeast("16.0.10", "16.0.7"), isAtLeast("15.10.0", "15.2.0")]).toEqual([
    true,
    true,
    true,
  ]);
  expect([isAtLeast("16.0.6", "16.0.7"), isAtLeast("9.9.9", "15.2.0")]).toEqual([false, false]);
});

test("every package that we ask for is asked for in one exact version, from the registry", () => {
  expect(Object.keys(wanted).length).toBeGreaterThan(30);
  for (const [name, version] of Object.entries(wanted)) expect(version, name).toMatch(/^(npm:[\w@/.-]+@)?\d+\.\d+\.\d+$/);
});

test("the lock file holds exactly those, a checksum of each package and no place to fetch it from", () => {
  expect(lock.lockfileVersion).toBe(3);
  expect({ ...lock.packages[""].dependencies, ...lock.packages[""].devDependencies }).toEqual(wanted);
  for (const [name, version] of Object.entries(wanted)) {
    expect(lock.packages[`node_modules/${name}`]?.version, name).toBe(version.replace(/^npm:.*@/, ""));
  }
  for (const [path, entry] of locked) {
    expect(entry.resolved, path).toBeUndefined();
    expect(entry.link, path).toBeUndefined();
    // What is packed inside another package is covered by that one's checksum.
    if (!entry.inBundle) expect(entry.integrity, path).toMatch(/^sha512-[A-Za-z0-9+/]{86}==$/);
  }
});

test("nothing that is installed runs a script of its own unless it was looked at", () => {
  const running = [...new Set(locked.filter(([, { hasInstallScript }]) => hasInstallScript).map(([path]) => nameOf(path)))];
  const known = ["esbuild", "fsevents", "sharp", ...Object.keys(manifest.allowScripts ?? {})];
  expect(running.filter((name) => !known.includes(name))).toEqual([]);
});

describe("holes that are known are closed in every copy", () => {
  test.each([
    ["next", "16.0.7", "CVE-2025-55182, any code on the server by one request"],
    ["mathjs", "15.2.0", "CVE-2026-40897 and CVE-2026-41139, any code by a formula"],
    ["next-auth", "4.24.12", "mail to an address that the sender chose, through nodemailer"],
    ["nodemailer", "7.0.7", "mail to a domain of somebody else's by a quoted address"],
  ])("%s is at least %s: %s", (name, least) => {
    const versions = versionsOf(name);
    expect(versions.length).toBeGreaterThan(0);
    for (const version of versions) expect(isAtLeast(version, least), version).toBe(true);
  });
});
