import type { ReactNode } from "react";

import { SiteFooter } from "@/components/site-footer";
import { SiteHeader } from "@/components/site-header";
import { getUser } from "@/lib/auth/session";

/** The chrome of the front door: signing in and joining. */
export default async function AuthLayout({ children }: { children: ReactNode }) {
  const user = await getUser();
  return (
    <div className="flex min-h-dvh flex-col">
      <SiteHeader user={user} places={user ? [{ href: "/desk", label: "desk" }] : []} />
      <main id="content" tabIndex={-1} className="flex-1 outline-none">
        {children}
      </main>
      <SiteFooter />
    </div>
  );
}
