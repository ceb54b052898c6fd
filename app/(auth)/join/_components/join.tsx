"use client";

import { useEffect, useState } from "react";

import { LinkButton } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { PageHeader, Sheet } from "@/components/ui/page";
import { SkeletonLines } from "@/components/ui/skeleton";
import type { Result } from "@/lib/action";
import type { InvitationView } from "@/lib/people/look-at-invitation";
import { ROLE_WORDS } from "@/lib/people/schema";
import { lookAtInvitationAction } from "../actions";
import { JoinAsNewPerson } from "./join-as-new-person";
import { JoinSignedIn } from "./join-signed-in";
import { SignInToJoin } from "./sign-in-to-join";

type Looked = { token: string; result: Result<InvitationView> };
export type SignedIn = { name: string; email: string } | null;

/** The link's secret is in the fragment, which no server and no log sees; opening the page spends nothing. */
export function Join({ user }: { user: SignedIn }) {
  const [looked, setLooked] = useState<Looked | null>(null);
  useEffect(() => {
    const token = window.location.hash.slice(1);
    void lookAtInvitationAction({ token }).then((result) => setLooked({ token, result }));
  }, []);
  if (!looked)
    return (
      <div role="status" aria-label="Reading the invitation">
        <PageHeader title="You are invited" />
        <SkeletonLines lines={4} />
      </div>
    );
  if (!looked.result.ok)
    return (
      <>
        <PageHeader title="This link does not work" />
        <Notice
          kind="error"
          title="Nothing was changed."
          action={<LinkButton href="/sign-in">Sign in</LinkButton>}
        >
          {looked.result.message}
        </Notice>
      </>
    );
  const { token, result } = looked;
  const invitation = result.data;
  return (
    <>
      <PageHeader title={titleOf(invitation)}>{sentenceOf(invitation)}</PageHeader>
      <Sheet className="px-6 py-7 sm:px-9">
        {user && user.email === invitation.email ? (
          <JoinSignedIn token={token} name={user.name} />
        ) : user ? (
          <OtherAddress user={user} />
        ) : invitation.hasAccount ? (
          <SignInToJoin token={token} email={invitation.email ?? ""} />
        ) : (
          <JoinAsNewPerson token={token} email={invitation.email} />
        )}
      </Sheet>
    </>
  );
}

function OtherAddress({ user }: { user: NonNullable<SignedIn> }) {
  return (
    <Notice
      kind="warn"
      title="This invitation was sent to another address"
      action={
        <form method="post" action="/sign-out">
          <button type="submit" className="link">
            Sign out
          </button>
        </form>
      }
    >
      You are signed in as {user.email}. Sign out, then open the link in the mail again.
    </Notice>
  );
}

function titleOf({ workTitle, role }: InvitationView): string {
  if (workTitle) return `You are invited to “${workTitle}”`;
  return role === "administrator" ? "Become an administrator" : "You are invited to Surdmark";
}

function sentenceOf({ invitedBy, role, workTitle }: InvitationView): string {
  if (role === "administrator")
    return "An administrator looks after accounts, outgoing mail and queues, and reads no works.";
  if (role === "person" || !workTitle)
    return `${invitedBy ?? "The administrator"} opens an account for you, with which you can start works.`;
  const { name, does } = ROLE_WORDS[role];
  return `${invitedBy ?? "A lead author"} asks you to take part as ${name}. ${does}`;
}
