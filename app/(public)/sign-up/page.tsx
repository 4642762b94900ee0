import type { Metadata } from "next";
import { SignUpForm } from "@/components/account/sign-up-form";
import { VisitorPage } from "@/components/account/visitor-page";

export const metadata: Metadata = { title: "Start a team" };

export default function Page() {
  return (
    <VisitorPage title="Start a team">
      <p className="mb-4 text-soft">You become its lead and can invite engineers and reviewers by mail.</p>
      <SignUpForm />
    </VisitorPage>
  );
}
