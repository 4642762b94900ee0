import type { Metadata } from "next";
import { NothingHere } from "@/components/ui/nothing-here";
import { SiteFooter } from "@/components/ui/site-footer";
import { SiteHeader } from "@/components/ui/site-header";

export const metadata: Metadata = { title: "Not found" };

export default function NotFound() {
  return (
    <>
      <SiteHeader signedIn={false} />
      <NothingHere />
      <SiteFooter />
    </>
  );
}
