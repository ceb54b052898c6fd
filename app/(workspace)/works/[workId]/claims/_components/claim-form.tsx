"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useEffect, useId, useRef, useState } from "react";
import { useForm } from "react-hook-form";
import type { z } from "zod";

import { ClaimCheck } from "@/components/claim-check";
import { Button } from "@/components/ui/button";
import { ErrorSummary } from "@/components/ui/error-summary";
import { Field } from "@/components/ui/field";
import { useToast } from "@/components/ui/toast";
import type { StoredClaim } from "@/lib/claims/find-claim";
import { ClaimText } from "@/lib/claims/schema";
import type { Conventions } from "@/lib/verify/conventions";
import { addClaimAction, editClaimAction } from "../actions";
import { ClaimConflict } from "./claim-conflict";
import { dropDraft, keepDraft, readDraft } from "./use-draft";

type Typed = z.input<typeof ClaimText>;
const FIELDS = ["ref", "quantity", "claimed", "note", "page"] as const;

export type ClaimFormProps = {
  workId: string;
  conventions: Conventions;
  /** a new claim goes to this problem; an existing one is changed */
  target: { kind: "new"; problemId: string } | { kind: "edit"; claimId: string; version: number };
  initial: { ref: string; quantity: string; claimed: string; note: string | null; page: string | null };
  onDone: (ref: string) => void;
  onCancel: () => void;
};

/**
 * One claim to be written: the symbol as it is printed, its claimed value, and what the verifier says of them while
 * they are typed. It is saved whatever the verdict. What was typed survives a failed save, a conflict and a reload.
 */
export function ClaimForm({ workId, conventions, target, initial, onDone, onCancel }: ClaimFormProps) {
  const id = useId();
  const say = useToast();
  const draftKey = target.kind === "new" ? `claim-of-${target.problemId}` : `claim-${target.claimId}`;
  const [start] = useState<Typed>(() => ({ ...initial, ...readDraft<Typed>(draftKey) }));
  const [version, setVersion] = useState(target.kind === "edit" ? target.version : 0);
  const [stored, setStored] = useState<StoredClaim | null>(null);
  const [attempt, setAttempt] = useState(0);
  const [failure, setFailure] = useState<string | null>(null);
  // The live check keeps what is typed in it; a new key hands it another text.
  const [sheet, setSheet] = useState({ key: 0, quantity: start.quantity, claimed: start.claimed });
  const form = useForm<Typed, unknown, ClaimText>({
    resolver: zodResolver(ClaimText),
    defaultValues: start,
    shouldFocusError: false,
  });
  const { errors, isSubmitting } = form.formState;
  const frame = useRef<HTMLFormElement>(null);

  useEffect(() => {
    frame.current
      ?.querySelector<HTMLInputElement>("input[type=text], input:not([type])")
      ?.focus({ preventScroll: true });
    frame.current?.scrollIntoView({ block: "nearest" });
  }, []);
  const keep = () => keepDraft(draftKey, form.getValues());

  async function save(values: ClaimText, against: number) {
    setFailure(null);
    keep();
    const result = await send(values, against).catch(() => null);
    if (result === null) {
      setFailure(
        "The server could not be reached. What you typed is kept here; save again when the line is back.",
      );
    } else if (result.ok) {
      dropDraft(draftKey);
      setStored(null);
      say(
        target.kind === "new" ? `${values.ref} is saved. The next run judges it.` : `${values.ref} is saved.`,
      );
      onDone(values.ref);
      return;
    } else if (result.code === "conflict" && result.details?.stored) {
      setStored(result.details.stored as StoredClaim);
      return;
    } else {
      for (const name of FIELDS)
        if (result.fields?.[name]) form.setError(name, { message: result.fields[name][0] });
      if (!FIELDS.some((name) => result.fields?.[name])) setFailure(result.message);
    }
    setAttempt((count) => count + 1);
  }

  const send = (values: ClaimText, against: number) =>
    target.kind === "new"
      ? addClaimAction({ ...values, workId, problemId: target.problemId })
      : editClaimAction({ ...values, workId, claimId: target.claimId, version: against });

  const submit = (against: number) =>
    form.handleSubmit(
      (values) => save(values, against),
      () => setAttempt((count) => count + 1),
    );

  const summary = [
    ...FIELDS.flatMap((name) =>
      errors[name]?.message ? [{ field: `${id}-${name}`, message: errors[name].message }] : [],
    ),
    ...(failure ? [{ message: failure }] : []),
  ];
  return (
    <form
      ref={frame}
      noValidate
      onSubmit={(event) => void submit(version)(event)}
      onKeyDown={(event) => {
        if (event.key === "Escape" && !event.defaultPrevented) onCancel();
      }}
      aria-label={target.kind === "new" ? "New claim" : `Claim ${initial.ref}`}
      className="grid gap-4 border-y border-blue bg-sheet py-5"
    >
      <ErrorSummary key={`summary-${attempt}`} items={summary} />
      {stored ? (
        <ClaimConflict
          stored={stored}
          mine={form.getValues()}
          onKeepMine={() => {
            setVersion(stored.version);
            void submit(stored.version)();
          }}
          onTakeTheirs={() => {
            const { ref, quantity, claimed, note, page } = stored;
            form.reset({ ref, quantity, claimed, note, page });
            setSheet((old) => ({ key: old.key + 1, quantity, claimed }));
            setVersion(stored.version);
            setStored(null);
            dropDraft(draftKey);
          }}
        />
      ) : null}
      <div className="grid gap-4 sm:grid-cols-[minmax(0,11rem)_minmax(0,1fr)_minmax(0,8rem)]">
        <Field
          id={`${id}-ref`}
          label="Reference"
          error={errors.ref}
          autoComplete="off"
          {...form.register("ref", { onChange: keep })}
        />
        <Field
          id={`${id}-note`}
          label="Note"
          optional
          error={errors.note}
          autoComplete="off"
          {...form.register("note", { onChange: keep })}
        />
        <Field
          id={`${id}-page`}
          label="Page"
          optional
          error={errors.page}
          autoComplete="off"
          {...form.register("page", { onChange: keep })}
        />
      </div>
      <ClaimCheck
        key={`check-${sheet.key}`}
        id={id}
        conventions={conventions}
        initial={{ quantity: sheet.quantity, claimed: sheet.claimed }}
        errors={{
          ...(errors.quantity?.message && { quantity: errors.quantity.message }),
          ...(errors.claimed?.message && { claimed: errors.claimed.message }),
        }}
        onChange={({ quantity, claimed }) => {
          const again = { shouldValidate: form.formState.isSubmitted, shouldDirty: true };
          form.setValue("quantity", quantity, again);
          form.setValue("claimed", claimed, again);
          keep();
        }}
      />
      <div className="flex flex-wrap items-center gap-x-4 gap-y-3">
        <Button type="submit" variant="primary" pending={isSubmitting} pendingLabel="Saving">
          {target.kind === "new" ? "Save claim" : "Save new version"}
        </Button>
        <Button
          onClick={() => {
            dropDraft(draftKey);
            onCancel();
          }}
        >
          {target.kind === "new" ? "Close" : "Leave as it was"}
        </Button>
        <p className="font-ui text-xs text-quiet">
          Saved whatever the note beside it says; the next run judges it.
        </p>
      </div>
    </form>
  );
}
