import { AsyncLocalStorage } from "node:async_hooks";

/** next-auth turns every error into a redirect; what was really refused, or failed, is kept here beside it for the reply. */
const store = new AsyncLocalStorage<{ refusal?: unknown }>();

export function keepRefusal(error: unknown): void {
  const holder = store.getStore();
  if (holder) holder.refusal = error;
}

/** @throws whatever was kept meanwhile */
export async function orRefusal<T>(work: () => Promise<T>): Promise<T> {
  const holder: { refusal?: unknown } = {};
  const result = await store.run(holder, work);
  if (holder.refusal !== undefined) throw holder.refusal;
  return result;
}
