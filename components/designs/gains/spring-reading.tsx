import { useMemo, useState } from "react";
import { ratePairs, virtualSprings } from "@/control/design/virtual-springs";
import type { PlantModel, Rows } from "@/control/plant/model";
import { WovenMatrix } from "../../matrix/woven-matrix";
import { Disclosure } from "../../ui/disclosure";
import { headersOf } from "../signal-headers";
import { springWords } from "./spring-words";

/** The gains of positions and their rates, read as springs and dampers, coupling included; worked out when it is unfolded. */
export function SpringReading({ model, K }: Readonly<{ model: PlantModel; K: Rows }>) {
  const [opened, setOpened] = useState(false);
  const pairs = useMemo(() => ratePairs(model), [model]);
  if (pairs.length === 0) return null;
  return (
    <Disclosure summary="Read as springs and dampers" onOpen={() => setOpened(true)}>
      {opened ? <Springs {...{ model, K }} /> : null}
    </Disclosure>
  );
}

function Springs({ model, K }: Readonly<{ model: PlantModel; K: Rows }>) {
  const springs = virtualSprings(model, K);
  if (!springs) return null;
  const rows = headersOf(model.inputs);
  const positions = springs.pairs.map(({ position }) => model.states[position]);
  const rates = positions.map((signal) => ({ ...signal, name: `${signal.name}'`, unit: `${signal.unit}/s`, scale: null }));
  return (
    <>
      <div className="flex flex-wrap gap-x-10 gap-y-6">
        <WovenMatrix
          name="Virtual stiffness"
          caption="input for one unit of position"
          rows={rows}
          columns={headersOf(positions)}
          values={springs.stiffness}
          copy={false}
        />
        <WovenMatrix
          name="Virtual damping"
          caption="input for one unit of its rate"
          rows={rows}
          columns={headersOf(rates)}
          values={springs.damping}
          copy={false}
        />
      </div>
      <ul className="mt-2 list-disc pl-5">
        {springWords(springs, model.states).map((sentence) => (
          <li key={sentence}>{sentence}</li>
        ))}
      </ul>
    </>
  );
}
