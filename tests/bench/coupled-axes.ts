import type { PlantContent } from "@/lib/schemas/plant";

type Row = string[];

/**
 * A row of carriages on springs, each with a position, a rate and a drive that lags; with `flexible` also a swinging load. All
 * numbers are made up.
 */
export function coupledAxes(axes: number, flexible: boolean): PlantContent {
  const kinds = flexible ? (["x", "v", "q", "w", "a"] as const) : (["x", "v", "a"] as const);
  const units = { x: "m", v: "m/s", q: "rad", w: "rad/s", a: "N" };
  const scales = { x: 0.001, v: 0.05, q: 0.02, w: 0.2, a: 40 };
  const states = Array.from({ length: axes }, (_, axis) =>
    kinds.map((kind) => ({ name: `${kind}${axis + 1}`, unit: units[kind], axis, scale: scales[kind] })),
  ).flat();
  const place = (kind: (typeof kinds)[number], axis: number) => states.findIndex(({ name }) => name === `${kind}${axis + 1}`);
  const zeros = (): Row => states.map(() => "0");
  const A = states.map(({ name, axis }): Row => {
    const row = zeros();
    const put = (kind: string, at: number, value: number) => {
      const column = states.findIndex((state) => state.name === `${kind}${at + 1}`);
      if (column >= 0) row[column] = String(value);
    };
    if (name.startsWith("x")) put("v", axis, 1);
    if (name.startsWith("v")) {
      put("x", axis, -120 - 10 * axis);
      put("x", axis - 1, 40);
      put("x", axis + 1, 40);
      put("v", axis, -0.6);
      put("a", axis, 0.08);
      put("q", axis, 2.5);
    }
    if (name.startsWith("q")) put("w", axis, 1);
    if (name.startsWith("w")) {
      put("q", axis, -30 - axis);
      put("w", axis, -0.2);
      put("x", axis, 60);
    }
    if (name.startsWith("a")) put("a", axis, -90);
    return row;
  });
  const inputs = Array.from({ length: axes }, (_, axis) => ({
    name: `F${axis + 1}`,
    unit: "N",
    axis,
    scale: 40,
    lower: -200,
    upper: 200,
  }));
  const B = states.map(({ name }): Row => inputs.map(({ axis }) => (name === `a${axis + 1}` ? "90" : "0")));
  const outputs = inputs.map(({ axis }) => ({ name: `enc${axis + 1}`, unit: "m", axis, scale: 0.001 }));
  const seen = (axis: number): Row => states.map((_, column) => (column === place("x", axis) ? "1" : "0"));
  const commanded = inputs.slice(0, 4).map(({ axis }) => ({ name: `y${axis + 1}`, unit: "m", axis, amplitude: 0.001 }));
  return {
    version: 1,
    timeBase: { kind: "continuous" },
    axes: inputs.map(({ axis }) => ({ name: `carriage ${axis + 1}`, tag: `C${axis + 1}` })),
    parameters: [],
    states,
    inputs,
    outputs,
    disturbances: [],
    commanded,
    A,
    B,
    C: outputs.map(({ axis }) => seen(axis)),
    D: null,
    E: null,
    H: commanded.map(({ axis }) => seen(axis)),
    J: null,
    operatingPoint: null,
    source: "",
  };
}
