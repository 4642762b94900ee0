import { EmptyState } from "../ui/empty-state";
import { LinkButton } from "../ui/link-button";

/** Leads an empty team to its first coupled response. */
export function FirstPlant({ mayWrite }: Readonly<{ mayWrite: boolean }>) {
  if (!mayWrite) {
    return (
      <EmptyState title="No plant yet">
        A plant is the coupled linear model of a machine. A lead or an engineer of the team enters it; you will find it here.
      </EmptyState>
    );
  }
  return (
    <EmptyState
      title="Your first plant"
      action={
        <div className="flex flex-wrap gap-3">
          <LinkButton tone="primary" href="/plants/new">
            Enter a plant
          </LinkButton>
          <LinkButton href="/templates">Start from a template</LinkButton>
        </div>
      }
    >
      <p>
        A plant is the coupled linear model of a machine: axes, named signals with units and limits, and the matrices. Three
        steps:
      </p>
      <ol className="mt-2 list-decimal pl-5">
        <li>Name the axes and signals, then type or paste A, B and C.</li>
        <li>Read the checks: which modes can be steered and seen.</li>
        <li>Weigh states against effort, solve, and see what every axis does.</li>
      </ol>
    </EmptyState>
  );
}
