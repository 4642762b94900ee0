import { readFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { decodeBase64 } from "../../control/accelerator/decode-base64";
import { KERNEL_BYTES } from "../../control/accelerator/kernel-bytes";
import { kernelModule } from "../../lib/commands/accelerator.mjs";
import { root } from "../../lib/commands/paths.mjs";

const file = join(root, "control/accelerator/kernel-bytes.ts");

test("the committed bytes of the accelerator are what its source compiles to", async () => {
  const committed = readFileSync(file, "utf8");
  expect(await kernelModule()).toBe(committed);
}, 60_000);

test("the accelerator imports nothing and is small enough to be compiled on the spot in any engine", () => {
  const bytes = Buffer.from(KERNEL_BYTES, "base64");
  expect(bytes.length).toBeLessThan(4096);
  const module = new WebAssembly.Module(bytes);
  expect(WebAssembly.Module.imports(module)).toEqual([]);
  expect(WebAssembly.Module.exports(module).map(({ name }) => name)).toEqual(
    expect.arrayContaining(["memory", "product", "wideProduct", "factor", "solve", "hessenberg", "sweep"]),
  );
});

test("base64 is decoded as Node decodes it, whatever its length", () => {
  for (let length = 0; length < 70; length++) {
    const bytes = Uint8Array.from({ length }, (_, i) => (i * 151 + length * 17) & 255);
    expect(decodeBase64(Buffer.from(bytes).toString("base64"))).toEqual(bytes);
  }
});
