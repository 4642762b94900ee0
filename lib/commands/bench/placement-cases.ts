import type { Complex } from "@/control/plant/model";
import { placePoles } from "@/control/poles/place-poles";
import { seededMatrix, seededUniform } from "@/tests/helpers/seeded";
import type { TimedCase } from "./timed-case";

type Mix = "mixed" | "real";

/** States, inputs, which poles, and the wanted share of SciPy's time. */
const SIZES: readonly (readonly [number, number, Mix, number])[] = [
  [4, 2, "real", 0.1],
  [5, 2, "mixed", 0.1],
  [6, 2, "mixed", 0.1],
  [6, 2, "real", 0.1],
  [8, 3, "mixed", 0.1],
  [8, 3, "real", 0.1],
  [12, 4, "mixed", 0.2],
  [12, 4, "real", 0.1],
  [12, 2, "mixed", 0.1],
  [12, 2, "real", 0.1],
  [20, 4, "mixed", 0.1],
  [20, 8, "mixed", 0.2],
];

/** Distinct poles; of mixed ones about half in pairs. */
function wanted(n: number, mix: Mix): Complex[] {
  const poles: Complex[] = [];
  const pairs = mix === "mixed" ? Math.floor(n / 4) : 0;
  for (let k = 0; k < pairs; k++) poles.push({ re: -1 - k / 4, im: 1 + k / 2 }, { re: -1 - k / 4, im: -1 - k / 2 });
  while (poles.length < n) poles.push({ re: -0.5 - poles.length / 4, im: 0 });
  return poles;
}

/** Both search for a loop with well-conditioned eigenvectors. */
export function placementCases(): TimedCase[] {
  return SIZES.map(([n, m, mix, target]) => {
    const random = seededUniform(100 * n + m);
    const [A, B, poles] = [seededMatrix(random, n, n), seededMatrix(random, n, m), wanted(n, mix)];
    return {
      name: `placement, ${n} states, ${m} inputs, ${mix} poles`,
      target,
      ours: () => placePoles({ A, B, poles }),
      question: { ask: "placement", A: A.to2DArray(), B: B.to2DArray(), poles: poles.map(({ re, im }) => [re, im]) },
    };
  });
}
