import Link from "next/link";
import type { ComponentProps, ReactNode } from "react";

const ROW = "flex min-h-11 w-full items-center gap-2.5 px-4 text-left no-underline hover:bg-sunk";

/** A place to go, inside a Menu. */
export function MenuLink(props: ComponentProps<typeof Link>) {
  return <Link className={ROW} {...props} />;
}

/** A press inside a Menu; `type="submit"` in a form of its own works without script. */
export function MenuButton({ type = "button", ...props }: ComponentProps<"button">) {
  return <button type={type} className={ROW} {...props} />;
}

/** A quiet line that says something and does nothing. */
export function MenuNote({ children }: { children: ReactNode }) {
  return <div className="border-b border-rule px-4 py-2.5 text-xs text-quiet">{children}</div>;
}
