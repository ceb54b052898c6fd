"use client";

import { useState } from "react";

import { Button } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { acceptSignedInAction } from "../actions";

/** Somebody who has an account and is signed in: one press. */
export function JoinSignedIn({ token, name }: { token: string; name: string }) {
  const [state, setState] = useState<{ pending: boolean; message: string | null }>({
    pending: false,
    message: null,
  });
  const accept = async () => {
    setState({ pending: true, message: null });
    const result = await acceptSignedInAction({ token });
    if (result.ok) return window.location.assign(result.data.path);
    setState({ pending: false, message: result.message });
  };
  return (
    <div className="grid gap-5">
      {state.message ? <Notice kind="error" title={state.message} live /> : null}
      <p>You are signed in as {name}.</p>
      <div>
        <Button
          variant="primary"
          size="large"
          pending={state.pending}
          pendingLabel="Joining"
          onClick={() => void accept()}
        >
          Accept the invitation
        </Button>
      </div>
    </div>
  );
}
