import type { ReactNode } from "react";
import { PageBody } from "../ui/page-body";
import { FrontSteps } from "./front-steps";

/** What the product does, in one screen: words and the way in on the left, a real design on the right. */
export function FrontDoor({ entrance, sheet }: Readonly<{ entrance: ReactNode; sheet: ReactNode }>) {
  return (
    <PageBody>
      <div className="grid items-start gap-x-14 gap-y-10 lg:grid-cols-[minmax(0,27rem)_minmax(0,1fr)]">
        <div>
          <h1 className="mb-3 text-[2.25rem] leading-[1.12] font-bold">
            State feedback for machines whose axes pull on each other
          </h1>
          <p className="mb-5 text-lg text-soft">
            From the linear model to gains that a colleague can check: one law for all axes at once, its coupling in plain sight,
            units and limits beside every number.
          </p>
          <div className="no-print mb-7 flex flex-wrap gap-3">{entrance}</div>
          <FrontSteps />
        </div>
        {sheet}
      </div>
    </PageBody>
  );
}
