"use client";

import { useRouter } from "next/navigation";
import { useTransition, type ComponentProps } from "react";

import { Mark } from "@/components/marks";
import { Button } from "@/components/ui/button";
import { useToast } from "@/components/ui/toast";
import { startRunAction } from "../actions";

/** Starts a run of a chapter (or, with null, of the whole work) and goes to its page. */
export function StartRunButton({
  workId,
  chapterId,
  label = "Start a run",
  variant = "primary",
  size,
}: {
  workId: string;
  chapterId: string | null;
  label?: string;
} & Pick<ComponentProps<typeof Button>, "variant" | "size">) {
  const router = useRouter();
  const say = useToast();
  const [pending, begin] = useTransition();
  const start = () =>
    begin(async () => {
      const result = await startRunAction({ workId, chapterId }).catch(() => null);
      if (result?.ok) return router.push(`/works/${workId}/runs/${result.data.runId}`);
      const path = result?.details?.path;
      say(result?.message ?? "The run was not started: the connection was lost. Try again.", {
        kind: "error",
        action: typeof path === "string" ? { label: "Watch it", run: () => router.push(path) } : undefined,
      });
    });
  return (
    <Button
      variant={variant}
      size={size}
      onClick={start}
      pending={pending}
      pendingLabel="Starting"
      mark={<Mark name="run" size={16} />}
    >
      {label}
    </Button>
  );
}
