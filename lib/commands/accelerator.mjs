import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { root } from "./paths.mjs";
import { Stop } from "./stop.mjs";

const source = join(root, "control/accelerator/kernel.as");
const target = join(root, "control/accelerator/kernel-bytes.ts");

/** The text of `control/accelerator/kernel-bytes.ts` that the kernel's source compiles to. */
export async function kernelModule() {
  const { default: compiler } = await import("assemblyscript/asc");
  /** @type {Uint8Array | undefined} */
  let bytes;
  const { error, stderr } = await compiler.main(
    ["kernel.ts", "--outFile", "kernel.wasm", "-O2", "--noAssert", "--runtime", "stub", "--enable", "simd"],
    {
      readFile: (name) => (name === "kernel.ts" ? readFileSync(source, "utf8") : null),
      writeFile: (_name, contents) => {
        bytes = /** @type {Uint8Array} */ (contents);
      },
      listFiles: () => [],
    },
  );
  if (error || !bytes)
    throw new Stop("The accelerator does not compile.", stderr.toString(), "Mend control/accelerator/kernel.as.");
  const text = Buffer.from(bytes).toString("base64");
  return `/** kernel.as compiled, in base64. Made by \`npm run build:accelerator\`; never changed by hand. */\nexport const KERNEL_BYTES =\n  "${text}";\n`;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) writeFileSync(target, await kernelModule());
