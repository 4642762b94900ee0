"use client";

import { type ReactNode, useEffect, useRef, useState } from "react";

const AHEAD = "300px";

/** Made when it comes into sight, and then kept: what is heavy costs nothing until somebody looks. */
export function WhenSeen({ minHeight, children }: Readonly<{ minHeight: number; children: ReactNode }>) {
  const place = useRef<HTMLDivElement>(null);
  const [seen, setSeen] = useState(false);
  useEffect(() => {
    const element = place.current;
    if (!element || seen) return;
    const show = () => setSeen(true);
    const observer = new IntersectionObserver((entries) => entries.some(({ isIntersecting }) => isIntersecting) && show(), {
      rootMargin: AHEAD,
    });
    observer.observe(element);
    window.addEventListener("beforeprint", show);
    return () => {
      observer.disconnect();
      window.removeEventListener("beforeprint", show);
    };
  }, [seen]);
  return (
    <div ref={place} style={seen ? undefined : { minHeight }}>
      {seen ? children : null}
    </div>
  );
}
