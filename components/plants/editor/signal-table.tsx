"use client";

import { EditorSection } from "./editor-section";
import { EditorTable } from "./editor-table";
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
    <EditorSection
      {...{ title, note, one }}
      onAdd={readOnly ? undefined : () => draft.set((now) => addSignal(now, list))}
      none="None."
      count={signals.length}
    >
      <EditorTable caption={title} headers={headers} buttons="Order and removal">
        {places.map(({ key, signal, index }) => (
          <SignalRow key={key} {...props} signal={signal} index={index} last={signals.length - 1} />
        ))}
      </EditorTable>
    </EditorSection>
  );
}
