import type { ReactNode } from "react";

import { SiteFooter } from "@/components/site-footer";
import { SiteHeader } from "@/components/site-header";
import { requireAdmin } from "@/lib/auth/session";

/** The chrome of the administration. It guards nothing by itself: each page and use case asks again. */
export default async function AdminLayout({ children }: { children: ReactNode }) {
  const { name, email, isAdmin } = await requireAdmin();
  return (
    <div className="flex min-h-dvh flex-col">
      <SiteHeader
        user={{ name, email, isAdmin }}
        places={[
          { href: "/desk", label: "desk" },
          { href: "/works/new", label: "new work" },
        ]}
      />
      <main id="content" tabIndex={-1} className="flex-1 outline-none">
        {children}
      </main>
      <SiteFooter />
    </div>
  );
}
