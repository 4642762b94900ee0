import type { ScryptOptions } from "node:crypto";

type Crypto = typeof import("node:crypto");
type Done = (error: Error | null, key: Buffer) => void;

/**
 * For files that hash a password for each of hundreds of tries: what one costs is measured elsewhere.
 * `vi.mock("node:crypto", async (original) => (await import("../helpers/quick-crypto")).quickCrypto(await original()))`
 */
export const quickCrypto = (crypto: Crypto) => ({
  ...crypto,
  scrypt: (password: string, salt: Buffer, length: number, options: ScryptOptions, done: Done) =>
    crypto.scrypt(password, salt, length, { ...options, N: 2 ** 10 }, done),
});
