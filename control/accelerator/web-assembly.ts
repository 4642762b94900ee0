/** The little of WebAssembly that is used here: neither ES2023 nor this folder's settings declare it. */
export type Memory = { readonly buffer: ArrayBuffer; grow(pages: number): number };

type WebAssemblyInterface = {
  readonly Module: new (bytes: Uint8Array) => object;
  readonly Instance: new (module: object) => { readonly exports: object };
};

/** Undefined where the engine has none. */
export const webAssembly = (globalThis as { readonly WebAssembly?: WebAssemblyInterface }).WebAssembly;
