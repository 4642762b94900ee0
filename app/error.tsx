"use client";

import { Button } from "@/components/ui/button";
import { ErrorState } from "@/components/ui/error-state";
import { LinkButton } from "@/components/ui/link-button";
import { PageBody } from "@/components/ui/page-body";

export default function PageError({ error, reset }: Readonly<{ error: Error & { digest?: string }; reset: () => void }>) {
  return (
    <PageBody>
      <h1 className="mb-4 text-title font-bold">This page could not be shown</h1>
      <ErrorState
        title="Something failed on our side."
        requestId={error.digest}
        action={
          <>
            <Button tone="primary" onClick={reset}>
              Try again
            </Button>
            <LinkButton href="/plants">Go to your plants</LinkButton>
          </>
        }
      >
        What was saved before is safe. Try again; if it fails once more, send the number below to whoever runs this service.
      </ErrorState>
    </PageBody>
  );
}
