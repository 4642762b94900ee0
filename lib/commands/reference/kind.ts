import { Matrix } from "ml-matrix";
import { seededMatrix } from "@/tests/helpers/seeded";

export type Rows = readonly (readonly number[])[];
/** What goes to the other process: `ask` names the routine, the rest are its arguments. */
export type Question = { readonly ask: string } & Readonly<Record<string, unknown>>;

/** One sort of problem, of which both libraries answer the same instances. */
export type Kind<Problem, Answer> = {
  readonly name: string;
  /** What `error` measures. */
  readonly measure: string;
  readonly problems: (random: () => number) => Problem[];
  readonly question: (problem: Problem) => Question;
  readonly ours: (problem: Problem) => Answer;
  readonly theirs: (reply: never) => Answer;
  /** Of two answers, relative to their size. */
  readonly difference: (problem: Problem, one: Answer, other: Answer) => number;
  /** What rounding allows for both together: a modest factor times the order, ε and the condition of the problem. */
  readonly allowed: (problem: Problem, ours: Answer) => number;
  /** Of one answer, without rounding: its residual or its true error, relative. */
  readonly error: (problem: Problem, answer: Answer) => number;
};

/** Backward errors of stable methods stay below this many n ε. */
export const FACTOR = 10;

export function random(uniform: () => number, rows: number, columns: number): Matrix {
  return seededMatrix(uniform, rows, columns);
}

/** Positive definite: one plus a product. */
export function randomWeight(uniform: () => number, n: number): Matrix {
  const M = seededMatrix(uniform, n, n);
  const weight = M.transpose().mmul(M);
  for (let i = 0; i < n; i++) weight.set(i, i, weight.get(i, i) + 1);
  return weight;
}

/** Largest distance of entries, over the largest entry. */
export function distance(one: Matrix, other: Matrix): number {
  let largest = 0;
  let apart = 0;
  for (let i = 0; i < one.rows; i++) {
    for (let j = 0; j < one.columns; j++) {
      largest = Math.max(largest, Math.abs(one.get(i, j)));
      apart = Math.max(apart, Math.abs(one.get(i, j) - other.get(i, j)));
    }
  }
  return apart === 0 ? 0 : apart / largest;
}

export const fromRows = (rows: Rows): Matrix => new Matrix(rows.map((row) => [...row]));
