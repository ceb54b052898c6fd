import type { Metadata } from "next";

import { PageBody } from "@/components/ui/page";
import { getUser } from "@/lib/auth/session";
import { Join } from "./_components/join";

export const metadata: Metadata = { title: "Join", referrer: "no-referrer" };

export default async function JoinPage() {
  const user = await getUser();
  return (
    <PageBody width="measure">
      <Join user={user && { name: user.name, email: user.email }} />
    </PageBody>
  );
}
