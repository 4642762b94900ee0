"use client";

import { type ReactNode, useEffect, useRef, useState } from "react";
import { useOnceTrue } from "../designs/use-once-true";

type OnceSeenProps = Readonly<{ height: number; now?: boolean; children: ReactNode }>;

/** Makes its content once it comes near the window, or at once with `now`; until then it keeps the room. */
export function OnceSeen({ height, now = false, children }: OnceSeenProps) {
  const box = useRef<HTMLDivElement>(null);
  const [near, setNear] = useState(false);
  const shown = useOnceTrue(near || now);
  useEffect(() => {
    const element = box.current;
    if (!element || shown) return;
    const observer = new IntersectionObserver(([entry]) => entry.isIntersecting && setNear(true), { rootMargin: "200px" });
    observer.observe(element);
    return () => observer.disconnect();
  }, [shown]);
  return (
    <div ref={box} data-chart-pending={shown ? undefined : ""} style={shown ? undefined : { minHeight: height }}>
      {shown ? children : null}
    </div>
  );
}
