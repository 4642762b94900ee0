"use client";

import { useSyncExternalStore } from "react";

/** The chart library draws with literal colours: they are read from the tokens, and again when the theme changes. */
export function useThemeKey(): string {
  return useSyncExternalStore(
    watchTheme,
    () => `${document.documentElement.dataset.theme ?? ""} ${matchMedia("(prefers-color-scheme: dark)").matches}`,
    () => "",
  );
}

function watchTheme(changed: () => void): () => void {
  const scheme = matchMedia("(prefers-color-scheme: dark)");
  const attribute = new MutationObserver(changed);
  attribute.observe(document.documentElement, { attributeFilter: ["data-theme"] });
  scheme.addEventListener("change", changed);
  return () => {
    attribute.disconnect();
    scheme.removeEventListener("change", changed);
  };
}

/** The colour that an expression such as `var(--axis-1)` has here and now. */
export function resolveColour(expression: string): string {
  const probe = document.createElement("span");
  probe.style.color = expression;
  probe.hidden = true;
  document.body.append(probe);
  const { color } = getComputedStyle(probe);
  probe.remove();
  return color;
}
