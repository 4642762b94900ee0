"use client";

import type { KeyboardEvent, PointerEvent } from "react";
import type { Complex } from "@/control/plant/model";
import { formatNumber } from "@/control/words/format-number";
import type { PoleMark } from "./pole-plane";
import { PLANE, type PlaneScale } from "./pole-plane-scale";

export type MovePole = (key: string, pole: Complex) => void;

type PoleHandlesProps = Readonly<{
  poles: readonly PoleMark[];
  sampled: boolean;
  scale: PlaneScale;
  onMove: MovePole;
  onHold: (holding: boolean) => void;
}>;

/** Drawing units that an arrow key moves a pole by; with Shift ten times as far. */
const KEY_STEP = 1;
/** How near to the stability boundary a pole can be moved, in drawing units. */
const CLEARANCE = 2;

/** Handles over the marks of a pole plane: dragged, or moved by arrow keys. A real pole stays real, a pair stays a pair. */
export function PoleHandles({ poles, sampled, scale, onMove, onHold }: PoleHandlesProps) {
  const moveTo = ({ key, pole }: PoleMark, x: number, y: number) =>
    onMove(key, stablePole(scale.poleAt(x, pole.im === 0 ? PLANE.height / 2 : y), pole.im === 0, sampled, scale));
  const drag = (mark: PoleMark) => (event: PointerEvent<HTMLButtonElement>) => {
    if (!event.currentTarget.hasPointerCapture(event.pointerId)) return;
    const { left, top, width, height } = event.currentTarget.parentElement?.getBoundingClientRect() ?? new DOMRect();
    moveTo(mark, ((event.clientX - left) / width) * PLANE.width, ((event.clientY - top) / height) * PLANE.height);
  };
  const press = (mark: PoleMark) => (event: KeyboardEvent) => {
    const step = event.shiftKey ? 10 * KEY_STEP : KEY_STEP;
    const by = { ArrowLeft: [-step, 0], ArrowRight: [step, 0], ArrowUp: [0, -step], ArrowDown: [0, step] }[event.key];
    if (!by) return;
    event.preventDefault();
    moveTo(mark, scale.x(mark.pole.re) + by[0], scale.y(mark.pole.im) + by[1]);
  };
  return (
    <div className="no-print absolute inset-0">
      {poles.map((mark) => (
        <button
          key={mark.key}
          type="button"
          aria-label={`Move ${mark.tag}, ${said(mark.pole)}, by arrow keys`}
          onKeyDown={press(mark)}
          onPointerDown={(event) => {
            event.currentTarget.setPointerCapture(event.pointerId);
            onHold(true);
          }}
          onPointerMove={drag(mark)}
          onLostPointerCapture={() => onHold(false)}
          style={{
            left: `${(scale.x(mark.pole.re) / PLANE.width) * 100}%`,
            top: `${(scale.y(mark.pole.im) / PLANE.height) * 100}%`,
          }}
          className="absolute size-6 -translate-x-1/2 -translate-y-1/2 cursor-grab touch-none rounded-full border border-transparent hover:border-control active:cursor-grabbing"
        />
      ))}
    </div>
  );
}

const said = ({ re, im }: Complex) => `${formatNumber(re)}${im === 0 ? "" : ` plus or minus ${formatNumber(im)} i`}`;

/** Kept inside the stable region and off the real axis, where a pair would become two poles. */
function stablePole({ re, im }: Complex, real: boolean, sampled: boolean, scale: PlaneScale): Complex {
  const unit = scale.poleAt(CLEARANCE, 0).re - scale.poleAt(0, 0).re;
  const upper = real ? 0 : Math.max(im, scale.poleAt(0, PLANE.height / 2 - CLEARANCE).im);
  if (!sampled) return { re: Math.min(re, -unit), im: upper };
  const radius = Math.sqrt(re * re + upper * upper);
  const shrink = radius > 1 - unit ? (1 - unit) / radius : 1;
  return { re: re * shrink, im: upper * shrink };
}
