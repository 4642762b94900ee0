import type { Metadata, Viewport } from "next";
import { cookies, headers } from "next/headers";
import type { ReactNode } from "react";
import { AppProviders } from "@/components/providers/app-providers";
import { SkipLink } from "@/components/ui/skip-link";
import { fontVariables } from "./fonts";
import "./globals.css";
import "./print.css";
import "../components/matrix/weave.css";
import "../components/plots/plots.css";

export const metadata: Metadata = {
  title: { default: "Gainwright", template: "%s · Gainwright" },
  description: "State feedback for coupled machines: from the linear model to gains a colleague has agreed to.",
  icons: { icon: "/favicon.svg" },
  robots: { index: false },
};

export const viewport: Viewport = {
  width: "device-width",
  initialScale: 1,
  themeColor: [
    { media: "(prefers-color-scheme: light)", color: "#fffefa" },
    { media: "(prefers-color-scheme: dark)", color: "#1b2023" },
  ],
};

/** Reading the headers makes every page dynamic, which the nonce policy needs; the cookie carries a chosen theme, so nothing flashes. */
export default async function RootLayout({ children }: Readonly<{ children: ReactNode }>) {
  const nonce = (await headers()).get("x-nonce") ?? undefined;
  const chosen = (await cookies()).get("theme")?.value;
  const theme = chosen === "light" || chosen === "dark" ? chosen : undefined;
  return (
    <html lang="en" className={fontVariables} data-theme={theme}>
      <head>
        {/* The chart library writes its rules into this element; made here, it carries the nonce. */}
        <style id="plotly.js-style-global" nonce={nonce} suppressHydrationWarning>
          {"/* chart rules */"}
        </style>
        {/* Its maps, never drawn, would add theirs without a nonce; an element of this id that stands already is left alone. */}
        <style id="ce8d464691048653ffe3a57c6c18ab566e8366f186677868cf724621a857b4fe" nonce={nonce} suppressHydrationWarning>
          {"/* no maps */"}
        </style>
      </head>
      <body>
        <SkipLink />
        <AppProviders nonce={nonce}>{children}</AppProviders>
      </body>
    </html>
  );
}
