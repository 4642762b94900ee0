import type { Metadata } from "next";
import { Cautions } from "@/components/ui/cautions";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { SheetSection } from "@/components/ui/sheet-section";

export const metadata: Metadata = { title: "Cautions" };

/** What stands beside every set of gains, and how far the numbers of this service reach. */
export default function CautionsPage() {
  return (
    <PageBody>
      <PageHeading title="Cautions" />
      <div className="mb-8 max-w-prose">
        <Cautions />
      </div>
      <div className="max-w-prose">
        <SheetSection title="What the numbers are" ruled>
          <ul className="list-disc space-y-2 pl-5">
            <li>
              Plants are linear about the operating point that was entered. Friction, backlash, saturation and everything else
              that is not in the matrices is not in the answers.
            </li>
            <li>
              States, inputs and outputs are deviations from that operating point, in the units written beside them. Gains act as{" "}
              <code>u = −K x + F r</code>, in the order of the signals that stand at the head of each row and column.
            </li>
            <li>
              A design has the time base of its plant. Gains of a continuous plant belong to a continuous law; running them at a
              sample rate is a decision of yours, and costs margin.
            </li>
            <li>
              Gains are verified before they are shown: the residual of the equation they came from stands beside them, and what
              could not be verified is refused with the reason, never shown as a guess.
            </li>
          </ul>
        </SheetSection>
        <SheetSection title="Before the first closing of a loop">
          <ul className="list-disc space-y-2 pl-5">
            <li>Check the sign and the unit of each sensor and each actuator with the loop open, one at a time.</li>
            <li>Compare the gains in the controller with the exported file, entry by entry.</li>
            <li>Limit travel, torque or current by means that do not run in this controller, and stand at the emergency stop.</li>
            <li>Start with small commands, and compare what the machine does with the predicted response before going on.</li>
          </ul>
        </SheetSection>
      </div>
    </PageBody>
  );
}
