"use client";

import {
  createContext,
  lazy,
  type ReactNode,
  Suspense,
  useCallback,
  useContext,
  useEffect,
  useMemo,
  useRef,
  useState,
} from "react";
import { RequestProblem } from "@/lib/client/request";
import type { Role } from "@/lib/schemas/team";

const loadSignIn = () => import("../account/sign-in-again").then((module) => ({ default: module.SignInAgain }));
const SignInAgain = lazy(loadSignIn);

export type PersonFacts = { readonly userId: string; readonly email: string };
export type SessionFacts = PersonFacts & { readonly teamId: string; readonly role: Role };

type Resume = {
  /** Does `work`; where the session is over, asks to sign in on this page and does it once more. */
  readonly resume: <T>(work: () => Promise<T>) => Promise<T>;
};
type Person = PersonFacts & Resume;
type Session = SessionFacts & Resume;

const SessionContext = createContext<Person | Session | null>(null);

/** Whoever is signed in, with or without a team: for the pages of their own account. */
export function usePerson(): Person {
  const session = useContext(SessionContext);
  if (!session) throw new Error("usePerson needs SessionProvider above it");
  return session;
}

/** Whoever is signed in, in the team whose page this is. */
export function useSession(): Session {
  const session = useContext(SessionContext);
  if (!session || !("teamId" in session)) throw new Error("useSession needs a team's SessionProvider above it");
  return session;
}

type Waiting = { readonly signedIn: () => void; readonly givenUp: () => void };

/** Keeps the page and everything typed while somebody signs in again. */
export function SessionProvider({ facts, children }: Readonly<{ facts: PersonFacts | SessionFacts; children: ReactNode }>) {
  const [asking, setAsking] = useState(false);
  // Stays in place once it was asked: only a dialog that is closed gives the focus back.
  const [asked, setAsked] = useState(false);
  const waiting = useRef<Waiting[]>([]);

  // Not needed to use the page, but must be there when the session ends, whatever has become of the server's files by then.
  useEffect(() => {
    loadSignIn().catch(() => undefined);
  }, []);

  const askToSignIn = useCallback(
    () =>
      new Promise<boolean>((resolve) => {
        waiting.current.push({ signedIn: () => resolve(true), givenUp: () => resolve(false) });
        setAsked(true);
        setAsking(true);
      }),
    [],
  );

  const resume = useCallback(
    async <T,>(work: () => Promise<T>): Promise<T> => {
      try {
        return await work();
      } catch (error) {
        if (!(error instanceof RequestProblem && error.needsSignIn)) throw error;
        if (!(await askToSignIn())) throw error;
        return work();
      }
    },
    [askToSignIn],
  );

  const settle = (how: keyof Waiting) => {
    setAsking(false);
    for (const one of waiting.current.splice(0)) one[how]();
  };
  const session = useMemo(() => ({ ...facts, resume }), [facts, resume]);
  return (
    <SessionContext value={session}>
      {children}
      {asked ? (
        // Its own boundary: without one, the page behind would be hidden while this loads, with all that was typed.
        <Suspense>
          <SignInAgain
            open={asking}
            email={facts.email}
            onSignedIn={() => settle("signedIn")}
            onGiveUp={() => settle("givenUp")}
          />
        </Suspense>
      ) : null}
    </SessionContext>
  );
}
