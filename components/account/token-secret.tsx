"use client";

import { useEffect, useRef } from "react";
import type { CreatedAccessToken } from "@/lib/schemas/account";
import { Button } from "../ui/button";
import { CopyButton } from "../ui/copy-button";
import { Notice } from "../ui/notice";

/** The one time that a token's secret is seen. Takes the focus, so that nobody works past it. */
export function TokenSecret({ token, onStored }: Readonly<{ token: CreatedAccessToken; onStored: () => void }>) {
  const box = useRef<HTMLDivElement>(null);
  useEffect(() => box.current?.focus(), []);
  return (
    <div ref={box} tabIndex={-1} className="mb-4 outline-none">
      <Notice
        kind="caution"
        title={`Copy the secret of “${token.name}” now.`}
        action={
          <>
            <CopyButton text={() => token.secret} label="Copy the secret" size="normal" />
            <Button onClick={onStored}>I have stored it</Button>
          </>
        }
      >
        It is kept here only as a fingerprint and is never shown again. Whoever holds it acts as you, within its scope.
        <code className="mt-2 block border border-rule bg-sheet px-2.5 py-1.5 break-all select-all">{token.secret}</code>
      </Notice>
    </div>
  );
}
