import { NothingHere } from "@/components/ui/nothing-here";

/** Keeps the team's header above. */
export default function TeamNotFound() {
  return <NothingHere />;
}
