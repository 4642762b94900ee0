import { formatNumber } from "@/control/words/format-number";
import type { TimeGrid } from "./response-data";

export type SampledSeries = {
  readonly key: string;
  readonly label: string;
  readonly unit: string;
  readonly values: ArrayLike<number>;
  /** Seconds between samples, where it differs from the table's. */
  readonly step?: number;
};

const INSTANTS = 11;

/** The curves as figures, at eleven instants from first to last sample of `time`; a series of another step gives its nearest sample. */
export function SampledValues({
  caption,
  time,
  series,
}: Readonly<{ caption: string; time: TimeGrid; series: readonly SampledSeries[] }>) {
  const instants = Array.from({ length: INSTANTS }, (_, i) => Math.round((i * (time.samples - 1)) / (INSTANTS - 1)));
  return (
    <table className="border-collapse text-table">
      <caption className="py-1 text-left font-semibold">{caption}</caption>
      <thead>
        <tr className="border-b border-ink text-sm text-soft">
          <th scope="col" className="py-1 pr-4 text-right font-normal">
            Time, s
          </th>
          {series.map(({ key, label, unit }) => (
            <th key={key} scope="col" className="py-1 pr-4 text-right font-normal">
              {label}, {unit}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {[...new Set(instants)].map((k) => (
          <tr key={k} className="border-b border-rule text-right font-mono">
            <th scope="row" className="py-0.5 pr-4 font-normal">
              {formatNumber(k * time.step)}
            </th>
            {series.map(({ key, values, step = time.step }) => {
              const nearest = Math.round((k * time.step) / step);
              return (
                <td key={key} className="py-0.5 pr-4">
                  {nearest < values.length ? formatNumber(values[nearest]) : "–"}
                </td>
              );
            })}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
