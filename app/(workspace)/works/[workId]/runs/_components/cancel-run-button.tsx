"use client";

import { useRouter } from "next/navigation";
import { useTransition } from "react";

import { Mark } from "@/components/marks";
import { Button } from "@/components/ui/button";
import { useToast } from "@/components/ui/toast";
import { cancelRunAction } from "../actions";

/** Stops a run that is going. */
export function CancelRunButton({ workId, runId }: { workId: string; runId: string }) {
  const router = useRouter();
  const say = useToast();
  const [pending, begin] = useTransition();
  const cancel = () =>
    begin(async () => {
      const result = await cancelRunAction({ workId, runId }).catch(() => null);
      if (result?.ok) say("The run is cancelled. What it judged so far stays with the claims.");
      else
        say(result?.message ?? "The run was not cancelled: the connection was lost. Try again.", {
          kind: "error",
        });
      router.refresh();
    });
  return (
    <Button
      variant="quiet"
      onClick={cancel}
      pending={pending}
      pendingLabel="Cancelling"
      mark={<Mark name="close" size={14} />}
    >
      Cancel the run
    </Button>
  );
}
