import type { Metadata } from "next";
import { ForgottenPasswordForm } from "@/components/account/forgotten-password-form";
import { VisitorPage } from "@/components/account/visitor-page";

export const metadata: Metadata = { title: "Forgotten password" };

export default function Page() {
  return (
    <VisitorPage title="Forgotten password">
      <p className="mb-4 text-soft">We send a link to a page where you choose a new one.</p>
      <ForgottenPasswordForm />
    </VisitorPage>
  );
}
