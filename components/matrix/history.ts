/** Undo and redo over immutable states; pure, so that one history can serve a single grid or a whole document. */
export type History<T> = { readonly past: readonly T[]; readonly present: T; readonly future: readonly T[] };

/** Steps that can be taken back. Older ones are forgotten. */
export const HISTORY_STEPS = 200;

export const startHistory = <T>(present: T): History<T> => ({ past: [], present, future: [] });

/** A change that is no change is not a step. */
export function advance<T>(history: History<T>, next: T): History<T> {
  if (Object.is(next, history.present)) return history;
  return { past: [...history.past.slice(1 - HISTORY_STEPS), history.present], present: next, future: [] };
}

export function stepBack<T>(history: History<T>): History<T> {
  const previous = history.past.at(-1);
  if (history.past.length === 0) return history;
  return { past: history.past.slice(0, -1), present: previous as T, future: [history.present, ...history.future] };
}

export function stepForward<T>(history: History<T>): History<T> {
  if (history.future.length === 0) return history;
  const [next, ...future] = history.future;
  return { past: [...history.past, history.present], present: next, future };
}
