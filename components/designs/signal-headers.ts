import type { Header } from "../matrix/header";

type Named = { readonly name: string; readonly unit: string; readonly axis: number | null; readonly scale?: number | null };

/** Signals as heads of a matrix. */
export const headersOf = (signals: readonly Named[]): Header[] =>
  signals.map(({ name, unit, axis, scale }) => ({ label: name, unit, axis, scale: scale ?? null }));
