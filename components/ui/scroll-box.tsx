"use client";

import { type ReactNode, useEffect, useRef, useState } from "react";

/** Lets a wide table scroll by itself. Only while it does, it is a named region that the keyboard can reach and move. */
export function ScrollBox({ label, children }: Readonly<{ label: string; children: ReactNode }>) {
  const box = useRef<HTMLDivElement>(null);
  const [scrolls, setScrolls] = useState(false);
  useEffect(() => {
    const element = box.current;
    if (!element) return;
    const observer = new ResizeObserver(() => setScrolls(element.scrollWidth > element.clientWidth + 1));
    observer.observe(element);
    if (element.firstElementChild) observer.observe(element.firstElementChild);
    return () => observer.disconnect();
  }, []);
  const region = scrolls ? ({ role: "region", "aria-label": label, tabIndex: 0 } as const) : {};
  return (
    <div ref={box} className="relative max-w-full overflow-x-auto print:overflow-visible" {...region}>
      {children}
    </div>
  );
}
