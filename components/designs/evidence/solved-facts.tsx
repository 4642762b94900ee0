import { StateMark } from "../../ui/state-mark";
import { TypesetNumber } from "../../ui/typeset-number";
import { methodText } from "./evidence-words";
import type { GainsReply, ObserverReply } from "./figures-reply";

const FOUR_DIGITS = 1e-4;

/** How the gain was found and how far it can be trusted. */
export function SolvedFacts({ gains }: Readonly<{ gains: GainsReply }>) {
  const { method, residual, bound, errorBound, poleError, eigenvectorCondition, gainNorm, poleShiftPerGainDigit } = gains;
  return (
    <div className="text-table">
      <p>{methodText(method)}.</p>
      <Verified residual={residual} bound={bound} />
      <ul className="text-soft">
        {errorBound === null ? null : (
          <li>
            Relative error of K at most <TypesetNumber value={errorBound} />
          </li>
        )}
        {poleError === null ? null : (
          <li>
            Poles placed to <TypesetNumber value={poleError} /> of their size
          </li>
        )}
        <li>
          {eigenvectorCondition === null ? (
            "Eigenvectors of the loop are not independent"
          ) : (
            <>
              Condition of the eigenvectors <TypesetNumber value={eigenvectorCondition} digits={3} />
            </>
          )}
        </li>
        {gainNorm === undefined ? null : (
          <li>
            Size of K <TypesetNumber value={gainNorm} digits={3} />: of all gains with these poles, one whose eigenvectors are as
            independent as could be found
          </li>
        )}
        {poleShiftPerGainDigit ? (
          <li>
            K kept to four digits moves a pole by up to <TypesetNumber value={FOUR_DIGITS * poleShiftPerGainDigit} digits={2} />{" "}
            of its size
          </li>
        ) : null}
      </ul>
    </div>
  );
}

/** The remainder of the equation against what rounding allows. */
export function Verified({ residual, bound }: Pick<ObserverReply, "residual" | "bound">) {
  const met = residual <= bound;
  return (
    <p className="flex items-baseline gap-1.5">
      <StateMark kind={met ? "met" : "unmet"} word={met ? "Verified: " : "Not verified: "} />
      <span>
        Residual <TypesetNumber value={residual} />, {met ? "within" : "beyond"} its bound of <TypesetNumber value={bound} />
      </span>
    </p>
  );
}
