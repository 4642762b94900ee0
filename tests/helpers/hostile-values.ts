import type { z } from "zod";

type Random = () => number;
const pick = <T>(random: Random, list: readonly T[]): T => list[Math.floor(random() * list.length)];

/** What JSON can bring, and what only our own code could hand over by mistake. */
const SIMPLE: readonly unknown[] = [
  ...[null, undefined, true, false, 0, -0, -1, 1, 1.5, 61, 2 ** 53, 1e308, -1e308, 5e-324],
  ...[Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, 10n, Symbol("x"), () => 1, new Date(Number.NaN)],
  ...[
    "",
    " ",
    "0",
    "1",
    "-1",
    "null",
    "NaN",
    "a",
    "x1",
    "\0",
    "\ud800",
    "\u202e",
    "\r\nSet-Cookie: a=b",
    "__proto__",
    "constructor",
  ],
  ...[
    "a".repeat(121),
    "(".repeat(3_000),
    "𝔘".repeat(300),
    "' or 1=1 --",
    "<script>",
    "=1+1",
    "%00",
    "../../x",
    "1e999",
    "2026-13-45",
  ],
  ...[
    "00000000-0000-4000-8000-000000000000",
    "a@b.example",
    "2031-04-05T06:07:08Z",
    "//elsewhere.example",
    "javascript:alert(1)",
  ],
];

function nested(depth: number): unknown {
  let value: unknown = [];
  for (let level = 0; level < depth; level++) value = level % 2 === 0 ? [value] : { a: value };
  return value;
}

const MADE: readonly ((random: Random) => unknown)[] = [
  () => [],
  () => ({}),
  () => nested(200),
  () => Object.create(null),
  () => JSON.parse('{"__proto__": {"polluted": true}, "constructor": {"prototype": {"polluted": true}}}'),
  () => ({ length: -1 }),
  () => ({ length: 1e9 }),
  () => new Map([["a", 1]]),
  () => new Array(5),
  () => [[], {}, null, [[[]]]],
  (random) => Array.from({ length: 100 }, () => pick(random, SIMPLE)),
  (random) => Array.from({ length: 13 }, () => Array.from({ length: 61 }, () => random())),
  (random) => Object.fromEntries(Array.from({ length: 80 }, (_, i) => [`key-${i}`, pick(random, SIMPLE)])),
];

/** Anything at all, seeded. */
export const hostileValue = (random: Random): unknown => (random() < 0.6 ? pick(random, SIMPLE) : pick(random, MADE)(random));

/**
 * A value that looks like what the schema asks for, with something hostile in `share` of its places: so that whatever looks at
 * several fields at once meets some that are right beside some that are not.
 */
export function almostRight(schema: z.core.$ZodType, random: Random, share: number): unknown {
  if (random() < share) return hostileValue(random);
  const inner = (part: z.core.$ZodType) => almostRight(part, random, share);
  const { def } = (schema as z.core.$ZodTypes)._zod;
  switch (def.type) {
    case "object":
      return almostRightObject(def.shape, random, share);
    case "array":
      return Array.from({ length: Math.floor(random() * 4) }, () => inner(def.element));
    case "record":
      return Object.fromEntries(["weights", "state:2", "m", "__proto__"].map((key) => [key, inner(def.valueType)]));
    case "union":
      return inner(pick(random, def.options));
    case "nullable":
      return random() < 0.3 ? null : inner(def.innerType);
    case "optional":
    case "default":
      return random() < 0.3 ? undefined : inner(def.innerType);
    case "catch":
      return inner(def.innerType);
    case "pipe":
      return inner(def.in);
    case "literal":
      return pick(random, def.values);
    case "enum":
      return pick(random, Object.values(def.entries));
    case "number":
      return pick(random, [1, 2, 0.5, 10, -3]);
    case "boolean":
      return random() < 0.5;
    default:
      return pick(random, ["m", "x1", "m/s", "00000000-0000-4000-8000-000000000000", "a@b.example", "2031-04-05T06:07:08Z"]);
  }
}

function almostRightObject(shape: z.core.$ZodShape, random: Random, share: number): unknown {
  const fields = Object.entries(shape).filter(() => random() >= share / 4);
  const value = fields.map(([name, part]) => [name, almostRight(part, random, share)]);
  if (random() < share) value.push([pick(random, ["extra", "__proto__", "toString", "~/x"]), hostileValue(random)]);
  return Object.fromEntries(value);
}
