"use client";

import { useQueries } from "@tanstack/react-query";
import { parseAsString, useQueryState } from "nuqs";
import { useMemo } from "react";
import { type CurveQuery, designKeys, fetchCurves } from "@/lib/client/designs";
import type { ResponseCurves } from "@/lib/schemas/evidence";
import { OverlayPlot } from "../plots/overlay-plot";
import { useSession } from "../providers/session-provider";
import { Button } from "../ui/button";
import { ErrorState } from "../ui/error-state";
import { LoadingState } from "../ui/loading-state";
import { Select } from "../ui/select";
import { SheetSection } from "../ui/sheet-section";
import type { Compared } from "./compare-types";
import { unionByName } from "./difference-marks";
import { commandText, loopOf, type Quantity, quantitiesOf, sentencesOf, sourceOf, tracesOf } from "./overlay-traces";
import { WhenSeen } from "./when-seen";

const HEIGHT = 300;

/** The curves of all designs over each other, for one commanded quantity at a time. */
export function OverlaidResponses({ designs }: Readonly<{ designs: readonly Compared[] }>) {
  const commands = unionByName(designs.map(({ model }) => model.commanded));
  const [asked, setAsked] = useQueryState("commanded", parseAsString.withOptions({ history: "replace" }));
  const commanded = commands.find(({ name }) => name === asked)?.name ?? commands[0]?.name;
  if (commanded === undefined) return null;
  return (
    <SheetSection title="Responses" note="hue: axis · dash: design" ruled>
      <Select
        label="Commanded"
        className="no-print mb-4 max-w-72"
        value={commanded}
        onChange={({ target }) => void setAsked(target.value)}
        options={commands.map(({ name }) => ({ value: name, label: commandText(designs, name) }))}
      />
      <WhenSeen minHeight={2 * HEIGHT}>
        <Curves designs={designs} commanded={commanded} />
      </WhenSeen>
    </SheetSection>
  );
}

function useStepCurves(designs: readonly Compared[], commanded: string) {
  const { resume } = useSession();
  return useQueries({
    queries: designs.map((design) => {
      const source = sourceOf(design, commanded);
      const query: CurveQuery = {
        kind: "step",
        loop: loopOf(design),
        source: Math.max(0, source),
        signals: ["commanded", "input"],
      };
      return {
        queryKey: designKeys.curves(design.id, query),
        queryFn: ({ signal }: { signal: AbortSignal }) => resume(() => fetchCurves(design.id, query, signal)),
        enabled: source >= 0,
        staleTime: Number.POSITIVE_INFINITY,
      };
    }),
    combine: (results) => ({
      curves: results.map(({ data }) => data?.at(0)),
      waiting: results.some(({ isLoading }) => isLoading),
      error: results.find(({ error }) => error)?.error ?? null,
      again: () => results.forEach(({ refetch }) => void refetch()),
    }),
  });
}

function Curves({ designs, commanded }: Readonly<{ designs: readonly Compared[]; commanded: string }>) {
  const { curves, waiting, error, again } = useStepCurves(designs, commanded);
  if (error) {
    return (
      <ErrorState title="The curves could not be fetched." action={<Button onClick={again}>Try again</Button>}>
        {error.message}
      </ErrorState>
    );
  }
  if (waiting) return <LoadingState label="Fetching the curves" />;
  if (curves.every((curve) => curve === undefined)) {
    return <p className="text-soft">None of these designs was stepped in {commanded}: their recipes ask for no reference.</p>;
  }
  return (
    <div className="grid gap-x-8 gap-y-8 lg:grid-cols-2">
      {quantitiesOf(designs).map((quantity) => (
        <WhenSeen key={`${quantity.role} ${quantity.name}`} minHeight={HEIGHT}>
          <Overlay {...{ designs, curves, commanded, quantity }} />
        </WhenSeen>
      ))}
    </div>
  );
}

type OverlayProps = Readonly<{
  designs: readonly Compared[];
  curves: readonly (ResponseCurves | undefined)[];
  commanded: string;
  quantity: Quantity;
}>;

function Overlay({ designs, curves, commanded, quantity }: OverlayProps) {
  const traces = useMemo(() => tracesOf(designs, curves, quantity), [designs, curves, quantity]);
  const summary = useMemo(() => sentencesOf(designs, commanded, quantity), [designs, commanded, quantity]);
  const label = quantity.role === "input" ? `${quantity.name}, effort` : quantity.name;
  if (traces.length === 0) return null;
  return (
    <OverlayPlot
      title={`${label}, with ${commandText(designs, commanded)}`}
      quantity={quantity.name}
      unit={quantity.unit}
      traces={traces}
      summary={summary}
      height={HEIGHT}
    />
  );
}
