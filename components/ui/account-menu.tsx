"use client";

import { useEffect, useState } from "react";
import { Menu, type MenuItem } from "./menu";
import { chooseTheme, currentTheme, THEMES, type Theme } from "./theme-choice";

type AccountMenuProps = Readonly<{
  team: string;
  role: string;
  person: string;
  onSignOut: () => void;
  extra?: readonly MenuItem[];
}>;

/** Team and role in the header, and behind them the account, the theme and the way out. */
export function AccountMenu({ team, role, person, onSignOut, extra = [] }: AccountMenuProps) {
  const [theme, setTheme] = useState<Theme>("system");
  useEffect(() => setTheme(currentTheme()), []);
  const items: readonly MenuItem[] = [
    { key: "account", label: "Account", href: "/account" },
    ...extra,
    ...THEMES.map(({ value, label }, index) => ({
      key: value,
      label,
      ruled: index === 0,
      checked: value === theme,
      onSelect: () => {
        chooseTheme(value);
        setTheme(value);
      },
    })),
    { key: "sign-out", label: "Sign out", ruled: true, onSelect: onSignOut },
  ];
  return (
    <Menu
      label={`${team} · ${role}`}
      ariaLabel={`${team}, ${role}, ${person}: account menu`}
      tone="quiet"
      align="end"
      items={items}
    />
  );
}
