import { Button } from "./button";

type ShowMoreProps = Readonly<{
  list: {
    readonly hasNextPage: boolean;
    readonly isFetchingNextPage: boolean;
    readonly fetchNextPage: () => unknown;
  };
}>;

/** Under a list that comes in pages. */
export function ShowMore({ list }: ShowMoreProps) {
  if (!list.hasNextPage) return null;
  return (
    <div className="mt-4">
      <Button busy={list.isFetchingNextPage} onClick={() => list.fetchNextPage()}>
        Show more
      </Button>
    </div>
  );
}
