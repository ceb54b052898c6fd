"use client";

import { useRouter } from "next/navigation";
import { useState, useTransition, type FormEvent } from "react";

import { Mark } from "@/components/marks";
import { Button } from "@/components/ui/button";
import { Field } from "@/components/ui/field";
import { Notice } from "@/components/ui/notice";
import { useToast } from "@/components/ui/toast";
import { freezeKeyAction } from "../actions";

/** The lead's signature: the name of the key, typed. Offered only when nothing prevents it. */
export function FreezePanel({
  workId,
  number,
  claims,
  ready,
}: {
  workId: string;
  number: number;
  claims: number;
  ready: boolean;
}) {
  const router = useRouter();
  const say = useToast();
  const [pending, start] = useTransition();
  const [error, setError] = useState<string | null>(null);
  const [refusal, setRefusal] = useState<string | null>(null);
  if (!ready)
    return (
      <p className="mt-6 border-t border-rule pt-4 text-quiet">
        Key {number} can be frozen when this list is empty.
      </p>
    );
  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const confirmation = String(new FormData(event.currentTarget).get("confirmation") ?? "");
    start(async () => {
      const result = await freezeKeyAction({ workId, number, confirmation });
      if (result.ok) {
        say(`Key ${result.data.number} is frozen.`);
        router.push(`/works/${workId}/keys/${result.data.number}`);
        return;
      }
      const field = result.fields?.confirmation?.[0] ?? null;
      setError(field);
      setRefusal(field ? null : result.message);
    });
  };
  return (
    <form
      onSubmit={submit}
      noValidate
      className="mt-6 grid max-w-measure gap-4 border-2 border-ink bg-sheet p-5"
    >
      <p>
        Freezing takes {claims === 1 ? "the one claim" : `all ${claims} claims`} as they now stand, recomputes
        each once more, and writes them down for good. Nobody can change or delete a frozen key; a later key
        says what changed.
      </p>
      {refusal ? (
        <Notice
          kind="warn"
          live
          title="Not frozen"
          action={
            <Button size="small" onClick={() => router.refresh()}>
              Look at preflight again
            </Button>
          }
        >
          {refusal}
        </Notice>
      ) : null}
      <Field
        label={`Type “key ${number}” to sign it`}
        name="confirmation"
        autoComplete="off"
        autoCapitalize="off"
        spellCheck={false}
        inputClassName="max-w-60"
        error={error}
      />
      <div>
        <Button
          type="submit"
          variant="primary"
          mark={<Mark name="seal" />}
          pending={pending}
          pendingLabel="Freezing"
        >
          Freeze key {number}
        </Button>
      </div>
    </form>
  );
}
