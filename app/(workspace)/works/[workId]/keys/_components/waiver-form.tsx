"use client";

import { useId, useState, useTransition, type FormEvent } from "react";

import { Button } from "@/components/ui/button";
import { TextArea } from "@/components/ui/field";
import { Disclosure } from "@/components/ui/disclosure";
import { useToast } from "@/components/ui/toast";
import { nameWaiverAction } from "../actions";

/** A lead answers for an undecided claim by name and reason; both are printed in the key. */
export function WaiverForm({
  workId,
  claimId,
  claimVersion,
  claimRef,
}: {
  workId: string;
  claimId: string;
  claimVersion: number;
  claimRef: string;
}) {
  const [pending, start] = useTransition();
  const [error, setError] = useState<string | null>(null);
  const say = useToast();
  const id = useId();
  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const reason = String(new FormData(event.currentTarget).get("reason") ?? "");
    start(async () => {
      const result = await nameWaiverAction({ workId, claimId, claimVersion, reason });
      setError(result.ok ? null : (result.fields?.reason?.[0] ?? result.message));
      if (result.ok) say(`${claimRef} may be frozen undecided; your name and reason stand in the key.`);
    });
  };
  return (
    <Disclosure summary="Name a waiver" className="border-0!">
      <form onSubmit={submit} className="grid gap-3" noValidate>
        <TextArea
          id={id}
          name="reason"
          rows={2}
          label={`Why ${claimRef} may be frozen undecided`}
          hint="Printed in the key with your name."
          error={error}
        />
        <div>
          <Button type="submit" size="small" pending={pending}>
            Name the waiver
          </Button>
        </div>
      </form>
    </Disclosure>
  );
}
