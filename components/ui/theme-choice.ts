export type Theme = "system" | "light" | "dark";

export const THEMES: readonly { readonly value: Theme; readonly label: string }[] = [
  { value: "system", label: "As this device" },
  { value: "light", label: "Day" },
  { value: "dark", label: "Night shift" },
];

const ONE_YEAR_MS = 31_536_000_000;

export function currentTheme(): Theme {
  const set = document.documentElement.dataset.theme;
  return set === "light" || set === "dark" ? set : "system";
}

/**
 * Applied at once, and kept in a cookie that the root layout reads, so that the next page arrives in it. Where the browser has no
 * cookie store (plain http away from loopback) the choice lasts until the page is loaded anew.
 */
export function chooseTheme(theme: Theme): void {
  const root = document.documentElement;
  if (theme === "system") delete root.dataset.theme;
  else root.dataset.theme = theme;
  if (!("cookieStore" in window)) return;
  const expires = theme === "system" ? 0 : Date.now() + ONE_YEAR_MS;
  void window.cookieStore.set({ name: "theme", value: theme, path: "/", expires, sameSite: "lax" });
}
