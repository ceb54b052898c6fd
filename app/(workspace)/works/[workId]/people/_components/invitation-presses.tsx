"use client";

import { useRouter } from "next/navigation";
import { useTransition } from "react";

import { Button } from "@/components/ui/button";
import { useToast } from "@/components/ui/toast";
import { resendInvitationAction, withdrawInvitationAction } from "../actions";

export function InvitationPresses({
  workId,
  invitationId,
  email,
}: {
  workId: string;
  invitationId: string;
  email: string;
}) {
  const [pending, start] = useTransition();
  const say = useToast();
  const router = useRouter();
  const which = { workId, invitationId };
  const run = (done: string, action: () => ReturnType<typeof resendInvitationAction>) =>
    start(async () => {
      const result = await action();
      say(result.ok ? done : result.message, { kind: result.ok ? "ok" : "error" });
      router.refresh();
    });
  return (
    <span className="flex flex-wrap gap-2">
      <Button
        size="small"
        disabled={pending}
        aria-label={`Send the invitation to ${email} again`}
        onClick={() =>
          run("A new link is on its way; the old one no longer works.", () => resendInvitationAction(which))
        }
      >
        Send again
      </Button>
      <Button
        size="small"
        disabled={pending}
        aria-label={`Withdraw the invitation to ${email}`}
        onClick={() => run("The invitation is withdrawn.", () => withdrawInvitationAction(which))}
      >
        Withdraw
      </Button>
    </span>
  );
}
