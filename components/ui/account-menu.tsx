"use client";

import { useEffect, useState } from "react";
import { Menu, type MenuItem } from "./menu";
import { chooseTheme, currentTheme, THEMES, type Theme } from "./theme-choice";

type AccountMenuProps = Readonly<{
  /** "Saltmarsh Motion · lead", or the person's name where there is no team. */
  label: string;
  /** The same with the person, for screen readers. */
  ariaLabel: string;
  onSignOut: () => void;
  extra?: readonly MenuItem[];
}>;

/** Who and where one is in the header, and behind it the account, the theme and the way out. */
export function AccountMenu({ label, ariaLabel, onSignOut, extra = [] }: AccountMenuProps) {
  const [theme, setTheme] = useState<Theme>("system");
  useEffect(() => setTheme(currentTheme()), []);
  const items: readonly MenuItem[] = [
    { key: "account", label: "Account", href: "/account" },
    ...extra,
    ...THEMES.map(({ value, label: name }, index) => ({
      key: value,
      label: name,
      ruled: index === 0,
      checked: value === theme,
      onSelect: () => {
        chooseTheme(value);
        setTheme(value);
      },
    })),
    { key: "sign-out", label: "Sign out", ruled: true, onSelect: onSignOut },
  ];
  return <Menu label={label} ariaLabel={ariaLabel} tone="quiet" align="end" items={items} />;
}
