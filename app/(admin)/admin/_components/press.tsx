"use client";

import { useTransition } from "react";

import { Button, type ButtonVariant } from "@/components/ui/button";
import { useToast } from "@/components/ui/toast";
import {
  resendSiteInvitationAction,
  setAccountEnabledAction,
  tryAgainAction,
  withdrawSiteInvitationAction,
} from "../actions";

type Answer = { ok: true } | { ok: false; message: string };

/** One press that does one thing and says how it went. */
function Press({
  label,
  name,
  done,
  variant,
  run,
}: {
  label: string;
  name: string;
  done: string;
  variant?: ButtonVariant;
  run: () => Promise<Answer>;
}) {
  const [pending, start] = useTransition();
  const say = useToast();
  return (
    <Button
      size="small"
      pending={pending}
      aria-label={name}
      {...(variant && { variant })}
      onClick={() =>
        start(async () => {
          const answer = await run();
          say(answer.ok ? done : answer.message, { kind: answer.ok ? "ok" : "error" });
        })
      }
    >
      {label}
    </Button>
  );
}

export function AccountSwitchPress({
  userId,
  name,
  enabled,
}: {
  userId: string;
  name: string;
  enabled: boolean;
}) {
  return (
    <Press
      label={enabled ? "Disable" : "Enable"}
      name={`${enabled ? "Disable" : "Enable"} ${name}`}
      done={enabled ? "The account is disabled and signed out everywhere." : "The account is enabled."}
      run={() => setAccountEnabledAction({ userId, enabled: !enabled })}
    />
  );
}

export function SiteInvitationPresses({ invitationId, email }: { invitationId: string; email: string }) {
  return (
    <span className="flex flex-wrap gap-2">
      <Press
        label="Send again"
        name={`Send the invitation to ${email} again`}
        done="A new link is on its way; the old one no longer works."
        run={() => resendSiteInvitationAction({ invitationId })}
      />
      <Press
        label="Withdraw"
        name={`Withdraw the invitation to ${email}`}
        done="The invitation is withdrawn."
        run={() => withdrawSiteInvitationAction({ invitationId })}
      />
    </span>
  );
}

export function TryAgainPress({ id, what }: { id: string; what: string }) {
  return (
    <Press
      label="Try again"
      name={`Try again: ${what}`}
      done="It is tried again now."
      run={() => tryAgainAction({ id })}
    />
  );
}
