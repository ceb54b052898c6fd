"use client";

import { useEffect, useRef, useState, type ComponentPropsWithoutRef } from "react";

/**
 * A box for something wide, which scrolls by itself and not with the page. Only while there is something to scroll can it be
 * reached by the keyboard, and says what it holds.
 */
export function ScrollBox({
  label,
  className = "",
  children,
  ...rest
}: { label: string } & ComponentPropsWithoutRef<"span">) {
  const box = useRef<HTMLSpanElement>(null);
  const [wide, setWide] = useState(false);
  useEffect(() => {
    const element = box.current;
    if (!element) return;
    const look = () => setWide(element.scrollWidth > element.clientWidth);
    look();
    const observer = new ResizeObserver(look);
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  const reach = wide ? ({ tabIndex: 0, role: "group", "aria-label": label } as const) : {};
  return (
    <span
      ref={box}
      className={`max-w-full overflow-x-auto overflow-y-hidden ${className}`}
      {...reach}
      {...rest}
    >
      {children}
    </span>
  );
}
