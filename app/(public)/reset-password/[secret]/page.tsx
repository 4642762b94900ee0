import type { Metadata } from "next";
import { NewPasswordForm } from "@/components/account/new-password-form";
import { VisitorPage } from "@/components/account/visitor-page";

export const metadata: Metadata = { title: "New password", referrer: "no-referrer" };

export default async function Page({ params }: Readonly<{ params: Promise<{ secret: string }> }>) {
  return (
    <VisitorPage title="New password">
      <NewPasswordForm secret={(await params).secret} />
    </VisitorPage>
  );
}
