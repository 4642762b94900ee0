"use client";

import { useState } from "react";
import type { Complex } from "@/control/plant/model";
import { formatNumber } from "@/control/words/format-number";
import { ComplexNum } from "../ui/num";
import { axisStyle } from "./axis-style";
import { type MovePole, PoleHandles } from "./pole-handles";
import { DAMPING_RAYS, PLANE, type PlaneScale, planeScale, rayEnd } from "./pole-plane-scale";

/** `closed` is a cross, `observer` an upright cross, `open` a square. The axis's hue is never alone: `tag` stands beside. */
export type PoleMark = {
  readonly key: string;
  /** A pair is given once, with im > 0. */
  readonly pole: Complex;
  readonly kind: "closed" | "observer" | "open";
  readonly axis: number | null;
  /** Short name beside the mark: the axis's tag or the mode. */
  readonly tag: string;
};

type PolePlaneProps = Readonly<{
  title: string;
  poles: readonly PoleMark[];
  /** Poles in z, with the unit circle; otherwise in 1/s, with damping rays. */
  sampled: boolean;
  /** Off where a table of the same poles stands beside. */
  table?: boolean;
  /** Makes the marks movable, by pointer and by arrow keys. */
  onMove?: MovePole;
}>;

const KIND_WORD: Readonly<Record<PoleMark["kind"], string>> = {
  closed: "closed loop",
  observer: "observer",
  open: "without control",
};

export function PolePlane({ title, poles, sampled, table = true, onMove }: PolePlaneProps) {
  const [held, setHeld] = useState<PlaneScale | null>(null);
  const fitting = planeScale(
    poles.map(({ pole }) => pole),
    sampled,
  );
  // While a mark is held, the plane stands still under it.
  const scale = held ?? fitting;
  return (
    <figure className="max-w-96 min-w-[17.5rem]">
      <figcaption className="mb-1 text-table font-semibold">{title}</figcaption>
      <div className="relative">
        <svg
          role="img"
          aria-label={`${title}: ${poles.length === 0 ? "none" : poles.map(inWords).join("; ")}`}
          viewBox={`0 0 ${PLANE.width} ${PLANE.height}`}
          className="w-full border border-rule bg-sheet font-mono text-[12px]"
        >
          <Ruling scale={scale} sampled={sampled} />
          {poles.flatMap((mark) =>
            (mark.pole.im === 0 ? [mark.pole] : [mark.pole, { re: mark.pole.re, im: -mark.pole.im }]).map((place) => (
              <Mark
                key={`${mark.key} ${Math.sign(place.im)}`}
                mark={mark}
                x={scale.x(place.re)}
                y={scale.y(place.im)}
                upper={place.im >= 0}
              />
            )),
          )}
        </svg>
        {onMove ? (
          <PoleHandles {...{ poles, sampled, scale, onMove }} onHold={(holding) => setHeld(holding ? fitting : null)} />
        ) : null}
      </div>
      {table ? <PoleTable title={title} poles={poles} unit={sampled ? undefined : "1/s"} /> : null}
    </figure>
  );
}

const inWords = ({ pole, kind, tag }: PoleMark) =>
  `${tag} ${formatNumber(pole.re)}${pole.im === 0 ? "" : ` plus or minus ${formatNumber(Math.abs(pole.im))} i`}, ${KIND_WORD[kind]}`;

function Ruling({ scale, sampled }: Readonly<{ scale: PlaneScale; sampled: boolean }>) {
  const [originX, originY] = [scale.x(0), scale.y(0)];
  return (
    <g fill="none" stroke="var(--rule)">
      {sampled ? <circle cx={originX} cy={originY} r={scale.x(1) - originX} stroke="var(--soft)" /> : null}
      {sampled
        ? null
        : DAMPING_RAYS.map((damping) => {
            const end = rayEnd(damping, scale);
            return (
              <g key={damping} strokeDasharray="3 3">
                <path d={`M${originX} ${originY}L${scale.x(end.re)} ${scale.y(end.im)}`} />
                <path d={`M${originX} ${originY}L${scale.x(end.re)} ${scale.y(-end.im)}`} />
                <text x={scale.x(end.re)} y={scale.y(-end.im) + 12} textAnchor="middle" fill="var(--soft)" stroke="none">
                  {damping}
                </text>
              </g>
            );
          })}
      <path d={`M0 ${originY}H${PLANE.width}`} />
      <path d={`M${originX} 0V${PLANE.height}`} stroke={sampled ? undefined : "var(--soft)"} strokeWidth={sampled ? 1 : 1.5} />
      <g fill="var(--soft)" stroke="none">
        <text x={originX + 4} y={12}>
          Im
        </text>
        <text x={PLANE.width - 4} y={originY + 13} textAnchor="end">
          Re
        </text>
        <text x={4} y={originY + 13}>
          {formatNumber(scale.left, 2)}
        </text>
        <text x={originX - 4} y={12} textAnchor="end">
          {formatNumber(scale.top, 2)}
        </text>
      </g>
    </g>
  );
}

function Mark({ mark, x, y, upper }: Readonly<{ mark: PoleMark; x: number; y: number; upper: boolean }>) {
  const shape = { closed: "m-4-4 8 8m0-8-8 8", observer: "m-5 0h10m-5-5v10", open: "m-4-4h8v8h-8z" }[mark.kind];
  return (
    <g>
      <path d={`M${x} ${y}${shape}`} fill="none" stroke={axisStyle(mark.axis).hue} strokeWidth="2" />
      {upper ? (
        <text x={x + 7} y={y - 5} fill="var(--ink)">
          {mark.tag}
        </text>
      ) : null}
    </g>
  );
}

function PoleTable({ title, poles, unit }: Readonly<{ title: string; poles: readonly PoleMark[]; unit: string | undefined }>) {
  return (
    <table className="mt-1 w-full border-collapse text-table">
      <caption className="sr-only">{title}, in figures</caption>
      <tbody>
        {poles.map(({ key, tag, kind, pole }) => (
          <tr key={key} className="border-b border-rule">
            <th scope="row" className="py-0.5 text-left font-normal">
              {tag}
            </th>
            <td className="px-2 text-sm text-soft">{KIND_WORD[kind]}</td>
            <td className="text-right">
              <ComplexNum value={pole} unit={unit} />
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
