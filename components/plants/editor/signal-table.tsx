"use client";

import { Button } from "../../ui/button";
import { ScrollBox } from "../../ui/scroll-box";
import { SheetSection } from "../../ui/sheet-section";
import { addSignal } from "./plant-document";
import { type AnySignal, SignalRow, type SignalTableProps } from "./signal-row";

/** One list of signals. Rows and columns of the matrices follow what is added, moved or removed here. */
export function SignalTable(props: SignalTableProps) {
  const { list, one, title, note, numbers, operating, draft, readOnly } = props;
  const signals = (draft.content[list] ?? []) as readonly AnySignal[];
  // A place in the list is what is edited: names change while they are typed.
  const places = signals.map((signal, index) => ({ key: `${list} ${index + 1}`, signal, index }));
  const headers = ["Name", "Unit", "Axis", ...numbers.map(({ header }) => header), ...(operating ? ["Operating point"] : [])];
  return (
    <SheetSection
      title={title}
      note={note}
      actions={
        readOnly ? null : (
          <Button size="small" onClick={() => draft.set((now) => addSignal(now, list))}>
            Add {one}
          </Button>
        )
      }
    >
      {signals.length === 0 ? (
        <p className="text-soft">None.</p>
      ) : (
        <ScrollBox label={title}>
          <table className="w-full border-collapse text-table">
            <caption className="sr-only">{title}</caption>
            <thead>
              <tr className="border-b border-ink text-left">
                {headers.map((header) => (
                  <th key={header} scope="col" className="px-2 py-1 font-normal text-soft">
                    {header}
                  </th>
                ))}
                <th scope="col" className="sr-only">
                  Order and removal
                </th>
              </tr>
            </thead>
            <tbody>
              {places.map(({ key, signal, index }) => (
                <SignalRow key={key} {...props} signal={signal} index={index} last={signals.length - 1} />
              ))}
            </tbody>
          </table>
        </ScrollBox>
      )}
    </SheetSection>
  );
}
