import fc from "fast-check";
import { afterEach, beforeEach, describe, expect, test, vi } from "vitest";
import { acceleratedFactor, acceleratedSolve } from "../../control/accelerator/accelerated-lu";
import { acceleratedProduct, acceleratedWideProduct } from "../../control/accelerator/accelerated-product";
import { acceleratedHessenberg } from "../../control/accelerator/accelerated-schur";
import { switchAccelerator } from "../../control/accelerator/accelerator";
import { NumericalError } from "../../control/errors";
import { split } from "../../control/linalg/double-double";
import { flatIdentity, flatProduct, flatTranspose, flatTransposedProduct } from "../../control/linalg/flat";
import { hessenbergByLoops } from "../../control/linalg/hessenberg";
import { factorByLoops, solveByLoops } from "../../control/linalg/lu";
import { productByLoops } from "../../control/linalg/product-loops";
import { flatSchur } from "../../control/linalg/real-schur";
import { wideProductByLoops } from "../../control/linalg/wide-product-loops";

afterEach(() => {
  switchAccelerator(true);
});

/** Ordinary numbers, halves of the smallest, the largest, and zeros of both signs. */
const entry = fc.oneof(
  { weight: 4, arbitrary: fc.double({ noNaN: true, noDefaultInfinity: true, min: -8, max: 8 }) },
  { weight: 1, arbitrary: fc.double({ noNaN: true, noDefaultInfinity: true }) },
  { weight: 1, arbitrary: fc.constantFrom(0, -0, 5e-324, -5e-324, 2.2e-308, -1.1e-308, 1, -1, 1e-160, -1e150) },
);
const flat = (length: number) => fc.array(entry, { minLength: length, maxLength: length }).map((list) => Float64Array.from(list));
/** Every remainder of the tiles; the inner size makes up for small sides, so that a call is always worth its copies. */
const shape = fc.tuple(fc.integer({ min: 1, max: 11 }), fc.integer({ min: 2, max: 11 })).chain(([rows, columns]) => {
  const least = Math.ceil(400 / (rows * columns));
  return fc.record({ rows: fc.constant(rows), columns: fc.constant(columns), inner: fc.integer({ min: least, max: least + 5 }) });
});

/** Both products of the same random matrices; b's second half lies below b, as in a wide number. */
const operands = shape.chain(({ rows, columns, inner }) =>
  fc.record({
    rows: fc.constant(rows),
    columns: fc.constant(columns),
    inner: fc.constant(inner),
    a: flat(rows * inner),
    b: flat(inner * columns),
    below: flat(inner * columns).map((list) => list.map((x) => x * 2 ** -54)),
  }),
);

/** Square matrices as they are typed and as they come out of scaling, dense and sparse. */
const square = fc.integer({ min: 5, max: 14 }).chain((n) => {
  const number = fc.oneof(
    { weight: 3, arbitrary: fc.double({ noNaN: true, noDefaultInfinity: true, min: -8, max: 8 }) },
    { weight: 2, arbitrary: fc.constantFrom(0, 0, 0, -0, 1, -1, 2 ** -40, -(2 ** 30), 1e-200) },
  );
  const list = fc.array(number, { minLength: n * n, maxLength: n * n });
  const sparse = fc.array(fc.constantFrom(0, 0, 1, -1), { minLength: n * n, maxLength: n * n });
  return fc.record({ n: fc.constant(n), a: fc.oneof(list, sparse).map((entries) => Float64Array.from(entries)) });
});

/** Without balancing, a nearly defective matrix of very unlike entries may fail to converge: then either way. */
function schurOrCode(a: Float64Array, n: number) {
  try {
    return flatSchur(a, n);
  } catch (error) {
    if (error instanceof NumericalError) return error.code;
    throw error;
  }
}

/** Places where two arrays differ in a bit; all NaN count as one. */
const different = (x: Float64Array | undefined, y: Float64Array) =>
  x === undefined ? ["missing"] : Array.from(y.keys()).filter((i) => !Object.is(x[i], y[i]));

describe("with the accelerator and without it every bit agrees", () => {
  beforeEach(() => {
    expect(switchAccelerator(true)).toBe(true);
  });

  test("in products of any shape, with subnormals, zeros of both signs and overflow", () => {
    fc.assert(
      fc.property(operands, ({ a, b, rows, inner, columns }) => {
        const fast = acceleratedProduct(a, b, rows, inner, columns);
        expect(different(fast ?? undefined, productByLoops(a, b, rows, inner, columns))).toEqual([]);
      }),
      { numRuns: 300, seed: 71 },
    );
  });

  test("in double-double products of any shape", () => {
    fc.assert(
      fc.property(operands, ({ a, b, below, rows, inner, columns }) => {
        const right = { hi: b, lo: below };
        const fast = acceleratedWideProduct(a, right, rows, inner, columns);
        const loops = wideProductByLoops(split(a), right, rows, inner, columns);
        expect(different(fast?.hi, loops.hi)).toEqual([]);
        expect(different(fast?.lo, loops.lo)).toEqual([]);
      }),
      { numRuns: 300, seed: 72 },
    );
  });
});

describe("reductions of a square matrix have the same bits either way", () => {
  test("to LU factors with rows exchanged, and solving with them", () => {
    const larger = fc
      .integer({ min: 15, max: 22 })
      .chain((n) => fc.record({ n: fc.constant(n), a: flat(n * n), b: flat(n * 7) }));
    fc.assert(
      fc.property(larger, ({ n, a, b }) => {
        const [fast, loops] = [a.slice(), a.slice()];
        const [fastRows, rows] = [Int32Array.from({ length: n }, (_, i) => i), Int32Array.from({ length: n }, (_, i) => i)];
        expect(acceleratedFactor(fast, fastRows, n)).toBe(factorByLoops(loops, rows, n));
        expect(fastRows).toEqual(rows);
        expect(different(fast, loops)).toEqual([]);
        const [fastX, x] = [b.slice(), b.slice()];
        expect(acceleratedSolve(loops, n, fastX, 7)).toBe(true);
        solveByLoops(loops, n, x, 7);
        expect(different(fastX, x)).toEqual([]);
      }),
      { numRuns: 200, seed: 76 },
    );
  });

  test("to Hessenberg form, with its basis", () => {
    fc.assert(
      fc.property(square, ({ n, a }) => {
        const [fast, loops] = [a.slice(), a.slice()];
        const [fastBasis, basis] = [flatIdentity(n), flatIdentity(n)];
        expect(acceleratedHessenberg(fast, n, fastBasis)).toBe(true);
        hessenbergByLoops(loops, n, basis);
        expect(different(fast, loops)).toEqual([]);
        expect(different(fastBasis, basis)).toEqual([]);
      }),
      { numRuns: 300, seed: 74 },
    );
  });

  test("to real Schur form, with its basis", () => {
    fc.assert(
      fc.property(square, ({ n, a }) => {
        const [fast, loops] = [true, false].map((on) => {
          switchAccelerator(on);
          return schurOrCode(a, n);
        });
        if (typeof fast === "string" || typeof loops === "string") expect(fast).toBe(loops);
        else {
          expect(different(fast.t, loops.t)).toEqual([]);
          expect(different(fast.qt, loops.qt)).toEqual([]);
        }
      }),
      { numRuns: 300, seed: 75 },
    );
  });
});

test("the loops sum every entry in order of the inner index, whatever the tile", () => {
  fc.assert(
    fc.property(operands, ({ a, b, rows, inner, columns }) => {
      const plain = Float64Array.from({ length: rows * columns }, (_, at) => {
        let sum = 0;
        for (let k = 0; k < inner; k++) sum += a[Math.floor(at / columns) * inner + k] * b[k * columns + (at % columns)];
        return sum;
      });
      expect(different(productByLoops(a, b, rows, inner, columns), plain)).toEqual([]);
      const turned = flatTranspose(a, rows, inner);
      expect(different(flatTransposedProduct(turned, b, inner, rows, columns), plain)).toEqual([]);
    }),
    { numRuns: 100, seed: 73 },
  );
});

test("memory grows with the matrices, and beyond its limit the loops take over", () => {
  const n = 300;
  const a = Float64Array.from({ length: n * n }, (_, i) => ((i * 7919) % 1009) / 1009 - 0.5);
  const fast = acceleratedProduct(a, a, n, n, n);
  expect(different(fast ?? undefined, productByLoops(a, a, n, n, n))).toEqual([]);
  expect(acceleratedProduct(new Float64Array(2_000_000), new Float64Array(4), 1_000_000, 2, 2)).toBeNull();
});

test("switched off, it is not called", () => {
  const a = new Float64Array(400).fill(1);
  expect(switchAccelerator(false)).toBe(false);
  expect(acceleratedProduct(a, a, 20, 20, 20)).toBeNull();
  expect(acceleratedWideProduct(a, { hi: a, lo: a }, 20, 20, 20)).toBeNull();
  expect(flatProduct(a, a, 20, 20, 20)).toEqual(new Float64Array(400).fill(20));
});

class RefusedModule {
  constructor() {
    throw new EvalError("Refused to compile or instantiate WebAssembly module");
  }
}

describe("where the engine cannot compile it, the loops serve", () => {
  test.each([
    ["no WebAssembly", undefined],
    ["a policy that forbids it", { Module: RefusedModule }],
  ])("%s", async (_name, engine) => {
    vi.stubGlobal("WebAssembly", engine);
    vi.resetModules();
    const fresh = await import("../../control/accelerator/accelerator");
    const { flatProduct: product } = await import("../../control/linalg/flat");
    const a = new Float64Array(400).fill(0.5);
    expect(fresh.switchAccelerator(true)).toBe(false);
    expect(product(a, a, 20, 20, 20)).toEqual(new Float64Array(400).fill(5));
    vi.unstubAllGlobals();
    vi.resetModules();
  });
});
