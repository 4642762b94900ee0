"use client";

import { type FormEvent, useId, useState } from "react";
import { Button } from "../../ui/button";
import { TextField } from "../../ui/text-field";

const MOST_AXES = 12;

/** "travel, turn" gives two axes, each with a position and a rate, one input and one output, to be changed at will. */
export function AxesChoice({ fresh, onChoose }: Readonly<{ fresh: boolean; onChoose: (names: readonly string[]) => void }>) {
  const [text, setText] = useState("");
  const id = useId();
  const names = text
    .split(",")
    .map((name) => name.trim().slice(0, 40))
    .filter((name) => name !== "");
  const problem =
    names.length > MOST_AXES
      ? `At most ${MOST_AXES} axes`
      : new Set(names).size < names.length
        ? "Each axis needs a name of its own"
        : undefined;
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (names.length > 0 && !problem) onChoose(names);
  };
  return (
    <form onSubmit={submit} className="flex max-w-full min-w-0 flex-wrap items-start gap-3">
      <TextField
        id={id}
        label="Axes, separated by commas"
        className="w-80 max-w-full"
        placeholder="travel, turn"
        value={text}
        problem={problem}
        hint={
          fresh
            ? "Gives every axis a position, a rate, an input and an output to start from."
            : "Starts over from blank matrices; Undo brings back what stands here."
        }
        onChange={({ target }) => setText(target.value)}
      />
      <Button type="submit" className="mt-[1.6rem]" disabled={names.length === 0 || problem !== undefined}>
        Lay out
      </Button>
    </form>
  );
}
