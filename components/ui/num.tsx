import type { Complex } from "@/control/plant/model";
import { formatComplex } from "@/control/words/format-complex";
import { formatNumber } from "@/control/words/format-number";
import { joinClasses } from "./join-classes";

type NumProps = Readonly<{
  /** null is said as a dash: the figure does not exist. */
  value: number | null;
  unit?: string;
  className?: string;
}>;

/** Four significant digits with the unit beside them; full precision on hover, and what is copied from `full`. */
export function Num({ value, unit, className }: NumProps) {
  if (value === null) return <NoFigure />;
  return (
    <span className={joinClasses("font-mono whitespace-nowrap", className)} title={fullPrecision(value, unit)}>
      {formatNumber(value)}
      {unit ? <span className="text-soft"> {unit}</span> : null}
    </span>
  );
}

/** A pole or zero; both of a conjugate pair at once, as `a ± b i`. */
export function ComplexNum({ value, unit }: Readonly<{ value: Complex; unit?: string }>) {
  const full = value.im === 0 ? String(value.re) : `${value.re} ± ${Math.abs(value.im)} i`;
  return (
    <span className="font-mono whitespace-nowrap" title={unit ? `${full} ${unit}` : full}>
      {formatComplex(value)}
      {unit ? <span className="text-soft"> {unit}</span> : null}
    </span>
  );
}

function NoFigure() {
  return (
    <span className="font-mono text-soft">
      <span aria-hidden="true">–</span>
      <span className="sr-only">none</span>
    </span>
  );
}

/** The shortest text that gives the same double back. */
export const fullPrecision = (value: number, unit?: string) => (unit ? `${String(value)} ${unit}` : String(value));
