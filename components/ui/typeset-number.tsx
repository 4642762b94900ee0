import { formatNumber } from "@/control/words/format-number";

/** A number within running text: 1.2 × 10⁻⁴ instead of 1.2e−4. Full precision on hover. */
export function TypesetNumber({ value, digits = 2 }: Readonly<{ value: number; digits?: number }>) {
  const [mantissa, exponent] = formatNumber(value, digits).split("e");
  return (
    <span className="whitespace-nowrap" title={String(value)}>
      {mantissa}
      {exponent === undefined ? null : (
        <>
          {" × 10"}
          <sup>{exponent}</sup>
        </>
      )}
    </span>
  );
}
