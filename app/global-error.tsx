"use client";

import { PageFailure, type PageFailureProps } from "@/components/ui/page-failure";
import { fontVariables } from "./fonts";
import "./globals.css";

/** Stands in for the root layout when that fails itself. */
export default function GlobalError({ error }: Pick<PageFailureProps, "error">) {
  return (
    <html lang="en" className={fontVariables}>
      <body>
        <title>Not available · Gainwright</title>
        <PageFailure error={error} title="Gainwright could not be shown" />
      </body>
    </html>
  );
}
