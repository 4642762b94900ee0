import { EmptyState } from "../ui/empty-state";
import { LinkButton } from "../ui/link-button";

/** What a template is and how the first one comes about. */
export function FirstTemplate({ mayPublish }: Readonly<{ mayPublish: boolean }>) {
  return (
    <EmptyState title="No template yet" action={<LinkButton href="/plants">Go to the plants</LinkButton>}>
      <p>
        A template is a plant with a few open parameters and a recipe that is known to work. Whoever starts from it fills in the
        parameters of their own machine and has a plant and a first design in one step.
      </p>
      <p className="mt-2">
        {mayPublish
          ? "To publish one, open a plant that has named parameters and a design, and choose “Save as template”."
          : "A lead of the team publishes them; you will find them here."}
      </p>
    </EmptyState>
  );
}
