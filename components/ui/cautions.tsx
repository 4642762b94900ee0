import { CAUTIONS } from "@/control/words/cautions";
import { Notice } from "./notice";

/** Stands wherever gains leave the product, in full; it is never folded away and is printed. */
export function Cautions() {
  return (
    <Notice kind="caution" title="Before these gains reach a machine">
      <ul className="mt-1 list-disc space-y-0.5 pl-5 text-table">
        {CAUTIONS.map((caution) => (
          <li key={caution}>{caution}</li>
        ))}
      </ul>
    </Notice>
  );
}
