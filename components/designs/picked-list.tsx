"use client";

import { useRouter } from "next/navigation";
import { FEWEST } from "@/lib/schemas/compared-count";
import { Button } from "../ui/button";
import { type Picked, pickedWords } from "./picked-revisions";
import { sideBySideAddress } from "./side-by-side-address";

type PickedListProps = Readonly<{ plantId: string; picked: readonly Picked[]; onRemove: (one: Picked) => void }>;

/** What is chosen so far, in the order it will stand; the first is what the others are held against. */
export function PickedList({ plantId, picked, onRemove }: PickedListProps) {
  const router = useRouter();
  const lay = () =>
    router.push(
      sideBySideAddress(
        plantId,
        picked.map(({ id }) => id),
      ),
    );
  return (
    <div className="flex flex-wrap items-center gap-3">
      <Button tone="primary" disabled={picked.length < FEWEST} onClick={lay}>
        Lay side by side
      </Button>
      <p role="status" className="text-sm text-soft">
        {pickedWords(picked)}
      </p>
      {picked.length > 0 ? (
        <ol aria-label="Chosen, in order" className="flex flex-wrap items-center gap-2 text-sm">
          {picked.map((one, index) => (
            <li key={one.id} className="inline-flex items-center gap-1 rounded-sm border border-rule bg-sheet pl-2">
              {index + 1}. {nameOf(one)}
              <Button size="small" tone="quiet" aria-label={`Leave out ${nameOf(one)}`} onClick={() => onRemove(one)}>
                <span aria-hidden="true">×</span>
              </Button>
            </li>
          ))}
        </ol>
      ) : null}
    </div>
  );
}

const nameOf = ({ name, number }: Picked) => `${name}, revision ${number}`;
