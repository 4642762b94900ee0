import type { Matrix } from "ml-matrix";
import { seededUniform } from "@/tests/helpers/seeded";
import type { Kind, Question } from "./kind";
import { exponential, hold } from "./kinds/exponential";
import { response } from "./kinds/frequency-response";
import { lyapunov } from "./kinds/lyapunov";
import { placement } from "./kinds/placement";
import { riccati } from "./kinds/riccati";
import { stepResponse } from "./kinds/step-response";
import { singular, spectrum } from "./kinds/values";

/** Answers to the questions, in their order, and the version of the library that gave them. */
export type Ask = (questions: readonly unknown[]) => Promise<{ version: string; answers: unknown[] }>;

export type Row = {
  readonly name: string;
  readonly problems: number;
  /** Largest part of what rounding allows. */
  readonly worst: number;
  readonly measure: string;
  /** Largest error of each library, and on how many problems ours is no larger. */
  readonly ourError: number;
  readonly theirError: number;
  readonly ahead: number;
};

const SEED = 20_250_601;

/** Matrices travel as rows. */
const plain = (question: Question) =>
  Object.fromEntries(
    Object.entries(question).map(([name, value]) => [
      name,
      typeof value === "object" && value !== null && "to2DArray" in value ? (value as Matrix).to2DArray() : value,
    ]),
  );

/** Questions of one kind, and what to make of the replies. */
type Prepared = { readonly questions: readonly unknown[]; readonly judged: (replies: readonly unknown[]) => Row };

function prepared<Problem, Answer>(kind: Kind<Problem, Answer>, index: number): Prepared {
  const problems = kind.problems(seededUniform(SEED + index));
  const judged = (replies: readonly unknown[]): Row => {
    const cases = problems.map((problem, k) => {
      const ours = kind.ours(problem);
      const theirs = kind.theirs(replies[k] as never);
      return {
        share: kind.difference(problem, ours, theirs) / kind.allowed(problem, ours),
        ourError: kind.error(problem, ours),
        theirError: kind.error(problem, theirs),
      };
    });
    return {
      name: kind.name,
      problems: problems.length,
      worst: worst(cases.map(({ share }) => share)),
      measure: kind.measure,
      ourError: worst(cases.map(({ ourError }) => ourError)),
      theirError: worst(cases.map(({ theirError }) => theirError)),
      ahead: cases.filter(({ ourError, theirError }) => ourError <= theirError).length,
    };
  };
  return { questions: problems.map((problem) => plain(kind.question(problem))), judged };
}

/** What cannot be judged is no agreement. */
const worst = (values: readonly number[]) => (values.some(Number.isNaN) ? Number.POSITIVE_INFINITY : Math.max(...values));

/** Every kind of problem solved by both, on the same seeded instances. */
export async function compareAll(ask: Ask): Promise<Row[]> {
  const kinds = [
    prepared(riccati(false), 0),
    prepared(riccati(true), 1),
    prepared(lyapunov(false), 2),
    prepared(lyapunov(true), 3),
    prepared(placement, 4),
    prepared(exponential, 5),
    prepared(hold, 6),
    prepared(stepResponse, 7),
    prepared(spectrum, 8),
    prepared(singular, 9),
    prepared(response, 10),
  ];
  const { answers } = await ask(kinds.flatMap(({ questions }) => questions));
  let from = 0;
  return kinds.map(({ questions, judged }) => {
    from += questions.length;
    return judged(answers.slice(from - questions.length, from));
  });
}
