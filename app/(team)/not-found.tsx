import type { Metadata } from "next";
import { NothingHere } from "@/components/ui/nothing-here";

export const metadata: Metadata = { title: "Not found" };

/** Keeps the team's header above. */
export default function TeamNotFound() {
  return <NothingHere />;
}
