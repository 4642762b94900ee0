"use client";

import { Button } from "./button";
import { buttonStyle } from "./button-style";
import { ErrorState } from "./error-state";
import { PageBody } from "./page-body";

export type PageFailureProps = Readonly<{ error: Error & { digest?: string }; title?: string }>;

/** What a page says when its own making failed. Both ways out are full loads, which also mend what failed in the browser. */
export function PageFailure({ error, title = "This page could not be shown" }: PageFailureProps) {
  return (
    <PageBody>
      <h1 className="mb-4 text-title font-bold">{title}</h1>
      <ErrorState
        title="Something failed on our side."
        requestId={error.digest}
        action={
          <>
            <Button tone="primary" onClick={() => window.location.reload()}>
              Try again
            </Button>
            <a href="/plants" className={buttonStyle()}>
              Go to your plants
            </a>
          </>
        }
      >
        What was saved before is safe. Try again; if it fails once more, send the number below to whoever runs this service.
      </ErrorState>
    </PageBody>
  );
}
