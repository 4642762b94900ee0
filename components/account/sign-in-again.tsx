"use client";

import { Dialog } from "../ui/dialog";
import { SignInForm } from "./sign-in-form";

type SignInAgainProps = Readonly<{ open: boolean; email: string; onSignedIn: () => void; onGiveUp: () => void }>;

/** Over the page whose session is over. */
export function SignInAgain({ open, email, onSignedIn, onGiveUp }: SignInAgainProps) {
  return (
    <Dialog open={open} onClose={onGiveUp} title="Sign in again to go on">
      <p className="mb-4">
        Your session is over. Everything on this page is kept; what you were doing goes on as soon as you are signed in.
      </p>
      <SignInForm email={email} onSignedIn={onSignedIn} />
    </Dialog>
  );
}
