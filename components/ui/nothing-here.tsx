import { LinkButton } from "./link-button";
import { PageBody } from "./page-body";
import { PageHeading } from "./page-heading";

/** The same words for what never was, what is gone and what belongs to another team. */
export function NothingHere() {
  return (
    <PageBody>
      <PageHeading title="Nothing is kept at this address" />
      <p className="mb-5 max-w-[60ch]">
        It may have been removed, or it belongs to a team you are not in. If somebody sent you the link, ask them which team it is
        for.
      </p>
      <LinkButton href="/plants" tone="primary">
        Go to your plants
      </LinkButton>
    </PageBody>
  );
}
