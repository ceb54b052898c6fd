import type { Metadata } from "next";
import { redirect } from "next/navigation";

import { Notice } from "@/components/ui/notice";
import { PageBody, PageHeader, Sheet } from "@/components/ui/page";
import { demoPeople } from "@/lib/auth/demo-people";
import { ownPath } from "@/lib/auth/own-path";
import { getUser } from "@/lib/auth/session";
import { SignInForm } from "./_components/sign-in-form";

export const metadata: Metadata = { title: "Sign in" };

export default async function SignInPage({ searchParams }: PageProps<"/sign-in">) {
  const query = await searchParams;
  const next = ownPath(query.next);
  if (await getUser()) redirect(next);
  return (
    <PageBody width="measure">
      <PageHeader title="Sign in">
        Accounts are by invitation, from a lead author or the administrator.
      </PageHeader>
      {query["signed-out"] ? (
        <Notice kind="ok" title="You are signed out." className="mb-6">
          The session has ended on our side too.
        </Notice>
      ) : null}
      <Sheet className="px-6 py-7 sm:px-9">
        <SignInForm next={next} demo={await demoPeople()} />
      </Sheet>
    </PageBody>
  );
}
