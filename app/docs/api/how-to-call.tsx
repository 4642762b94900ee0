import Link from "next/link";
import { SheetSection } from "@/components/ui/sheet-section";

/** What holds for every route. */
export function HowToCall() {
  return (
    <SheetSection title="How to call it">
      <div className="max-w-prose space-y-3">
        <p>
          Make an access token under <Link href="/account">Account</Link> and send it as <code>Authorization: Bearer</code>. A
          token with the scope read changes nothing. It is shown once and can be revoked at any time. A page of this service uses
          its session instead; a change by session must come from this service's own address.
        </p>
        <p>
          Bodies and replies are JSON in UTF-8, at most 1 MB, without compression. Numbers are finite and come back as the same
          double. Matrices are lists of rows, times are UTC, angles and lengths are in the unit of their signal.
        </p>
        <p>
          A reply about one plant, design, comparison or template carries its version as <code>ETag</code>. A change sends it back
          as <code>If-Match</code>; if somebody else was faster the answer is 412 and nothing is overwritten. A create carries an{" "}
          <code>Idempotency-Key</code> of your choice: the same key with the same body within 24 hours creates nothing twice and
          gets the first reply again.
        </p>
        <p>
          Lists come in pages of <code>{"{ items, nextCursor }"}</code>, at most 100 items each. Each person may send 600 reads,
          120 changes, 30 computations and 60 checks of a plant a minute, a whole team five times as many reads and changes and
          three times as many of the others; beyond that the answer is 429 with <code>Retry-After</code>. Two computations or
          checks of a team run at once and ten wait. Drafts, which a page keeps by itself, are counted apart: 120 a minute.
        </p>
        <p>
          Whatever is refused is answered with a problem document; <Link href="/docs/problems">the list of problems</Link> says
          what each one means and what to do. Send <code>X-Request-Id</code> to find your requests in the log.
        </p>
      </div>
    </SheetSection>
  );
}
