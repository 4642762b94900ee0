"use client";

import { Button } from "@/components/ui/button";
import { ErrorState } from "@/components/ui/error-state";
import { PageBody } from "@/components/ui/page-body";
import { fontVariables } from "./fonts";
import "./globals.css";

/** Stands in for the root layout when that fails itself. */
export default function GlobalError({ error }: Readonly<{ error: Error & { digest?: string } }>) {
  return (
    <html lang="en" className={fontVariables}>
      <body>
        <title>Not available · Gainwright</title>
        <PageBody>
          <h1 className="mb-4 text-title font-bold">Gainwright could not be shown</h1>
          <ErrorState
            title="Something failed on our side."
            requestId={error.digest}
            action={
              <Button tone="primary" onClick={() => window.location.reload()}>
                Try again
              </Button>
            }
          >
            What was saved before is safe. Try again in a moment.
          </ErrorState>
        </PageBody>
      </body>
    </html>
  );
}
