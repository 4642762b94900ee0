const MINUS = "\u2212";

/**
 * A number as it stands on screens: significant figures without idle zeros, a true minus sign, exponents as 1.2e−4.
 * Plain notation from 0.001 to 99 999; an exact zero is "0".
 */
export function formatNumber(value: number, significantDigits = 4): string {
  if (!Number.isFinite(value)) return "not a number";
  if (value === 0) return "0";
  const [mantissa, exponentText] = Math.abs(value)
    .toExponential(significantDigits - 1)
    .split("e");
  const exponent = Number(exponentText);
  const sign = value < 0 ? MINUS : "";
  if (exponent >= -3 && exponent <= 4) {
    const decimals = Math.max(0, significantDigits - 1 - exponent);
    return sign + withoutIdleZeros(Number(`${mantissa}e${exponent}`).toFixed(decimals));
  }
  return `${sign}${withoutIdleZeros(mantissa)}e${exponent < 0 ? MINUS : ""}${Math.abs(exponent)}`;
}

/** From rad/s. */
export function formatFrequency(radiansPerSecond: number, significantDigits = 3): string {
  const hertz = radiansPerSecond / (2 * Math.PI);
  return hertz >= 10_000
    ? `${formatNumber(hertz / 1000, significantDigits)} kHz`
    : `${formatNumber(hertz, significantDigits)} Hz`;
}

/** Seconds in the unit that people say: ms below 0.1 s, min above two minutes, h above two hours. */
export function formatSeconds(seconds: number, significantDigits = 3): string {
  const size = Math.abs(seconds);
  const [factor, unit] = size < 0.1 ? [1000, "ms"] : size < 120 ? [1, "s"] : size < 7200 ? [1 / 60, "min"] : [1 / 3600, "h"];
  return `${formatNumber(seconds * factor, significantDigits)} ${unit}`;
}

/** A share as percent. */
export function formatPercent(share: number, significantDigits = 2): string {
  return `${formatNumber(share * 100, significantDigits)} %`;
}

function withoutIdleZeros(text: string): string {
  return text.includes(".") ? text.replace(/0+$/, "").replace(/\.$/, "") : text;
}
