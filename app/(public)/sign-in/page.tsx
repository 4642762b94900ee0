import type { Metadata } from "next";
import { redirect } from "next/navigation";
import { SignInPage } from "@/components/account/sign-in-page";
import { currentPerson } from "@/lib/auth/session";
import { NextPath } from "@/lib/schemas/next-path";
import { demoSignIn } from "@/lib/services/account/demo-sign-in";

export const metadata: Metadata = { title: "Sign in" };

export default async function Page({ searchParams }: Readonly<{ searchParams: Promise<{ next?: unknown }> }>) {
  const path = NextPath.parse((await searchParams).next);
  if (await currentPerson()) redirect(path);
  return <SignInPage next={path} demo={demoSignIn()} />;
}
