export type QueueLimits = {
  /** At once, for one team. */
  readonly running: number;
  readonly waiting: number;
  /** Over all teams. */
  readonly waitingInAll: number;
};

/**
 * Whose turn it is: teams take turns, each waits in its own line, and none may run or wait beyond its share.
 * Knows nothing of workers or time.
 */
export class FairQueue<Task extends { readonly teamId: string }> {
  readonly #limits: QueueLimits;
  /** In order of turns: a team that was served goes to the end. */
  readonly #lines = new Map<string, Task[]>();
  readonly #running = new Map<string, number>();
  #waiting = 0;

  constructor(limits: QueueLimits) {
    this.#limits = limits;
  }

  /** False: the line of this team, or of all together, is full. */
  join(task: Task): boolean {
    const line = this.#lines.get(task.teamId) ?? [];
    if (line.length >= this.#limits.waiting || this.#waiting >= this.#limits.waitingInAll) return false;
    line.push(task);
    this.#lines.set(task.teamId, line);
    this.#waiting++;
    return true;
  }

  /** The next task whose team may run one more; it counts as running until `finished`. */
  next(): Task | undefined {
    for (const [teamId, line] of this.#lines) {
      const running = this.#running.get(teamId) ?? 0;
      if (running >= this.#limits.running) continue;
      const task = line.shift();
      if (!task) continue;
      this.#waiting--;
      this.#running.set(teamId, running + 1);
      this.#lines.delete(teamId);
      if (line.length > 0) this.#lines.set(teamId, line);
      return task;
    }
    return undefined;
  }

  finished(teamId: string): void {
    const left = (this.#running.get(teamId) ?? 0) - 1;
    if (left > 0) this.#running.set(teamId, left);
    else this.#running.delete(teamId);
  }

  /** Takes a waiting task out again; false when it waits no longer. */
  leave(task: Task): boolean {
    const line = this.#lines.get(task.teamId);
    const place = line?.indexOf(task) ?? -1;
    if (!line || place < 0) return false;
    line.splice(place, 1);
    if (line.length === 0) this.#lines.delete(task.teamId);
    this.#waiting--;
    return true;
  }

  /** Everything that waits, taken out. */
  drain(): readonly Task[] {
    const tasks = [...this.#lines.values()].flat();
    this.#lines.clear();
    this.#waiting = 0;
    return tasks;
  }
}
