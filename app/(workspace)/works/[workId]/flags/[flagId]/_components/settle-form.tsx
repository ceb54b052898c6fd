"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import type { z } from "zod";

import { Mark } from "@/components/marks";
import { MathHtml } from "@/components/math-html";
import { Button } from "@/components/ui/button";
import { ErrorSummary, type SummaryItem } from "@/components/ui/error-summary";
import { Field, RadioCards, TextArea } from "@/components/ui/field";
import { Notice } from "@/components/ui/notice";
import { useToast } from "@/components/ui/toast";
import { SettleFlag } from "@/lib/flags/schema";
import { settleFlagAction } from "../actions";
import { offerDraft } from "./draft";
import type { SettleView } from "./settle-view";

type Values = z.input<typeof SettleFlag>;
type Conflict = { message: string; state?: string; reason?: string; at?: string };

const REASON = {
  correct: { label: "Note for the claimant", hint: "Only if there is something to add.", optional: true },
  stet: {
    label: "Reason",
    hint: "Why the printed value stands although the recomputed one differs. At least ten characters; it is printed in the key.",
    optional: false,
  },
  reword: {
    label: "What has to change",
    hint: "The claimant reads this; the claim waits until they have saved a new version.",
    optional: false,
  },
  withdraw: { label: "Reason", hint: "For the history of the claim.", optional: true },
} as const;

/** The four words, what each does, and what it asks for. Whatever goes wrong, what was typed stays in the form. */
export function SettleForm(view: SettleView) {
  const { workId, flagId, version, correctionHtml, claimant, claimRef, next } = view;
  const router = useRouter();
  const say = useToast();
  const [conflict, setConflict] = useState<Conflict | null>(null);
  const [attempt, setAttempt] = useState(0);
  const form = useForm<Values, unknown, SettleFlag>({
    resolver: zodResolver(SettleFlag),
    defaultValues: { workId, flagId, version, reason: "", convention: "" },
    shouldFocusError: false,
  });
  const word = useWatch({ control: form.control, name: "word" });
  const { errors, isSubmitting } = form.formState;

  const submit = form.handleSubmit(
    async (values) => {
      setConflict(null);
      // The version that is on the screen now: a refresh after a conflict brings the new one.
      const result = await settleFlagAction({ ...values, version });
      if (result.ok) {
        say(`${claimRef} is settled: ${values.word}.`);
        router.push(next);
        return;
      }
      setAttempt((count) => count + 1);
      if (result.code === "conflict") {
        setConflict({ message: result.message, ...(result.details as Omit<Conflict, "message">) });
        return;
      }
      for (const [name, messages] of Object.entries(result.fields ?? {}))
        if (name === "word" || name === "reason" || name === "convention")
          form.setError(name, { message: messages[0] });
      form.setError("root", { message: result.message });
    },
    () => setAttempt((count) => count + 1),
  );

  if (!view.maySettle)
    return (
      <Notice kind="info" title="Somebody else settles this flag">
        {view.whyNot}
      </Notice>
    );
  const summary: SummaryItem[] = [
    ...(errors.word?.message ? [{ field: "settle-correct", message: errors.word.message }] : []),
    ...(errors.reason?.message ? [{ field: "settle-reason", message: errors.reason.message }] : []),
    ...(errors.convention?.message
      ? [{ field: "settle-convention", message: errors.convention.message }]
      : []),
    ...(errors.root?.message && !errors.word && !errors.reason && !errors.convention
      ? [{ message: errors.root.message }]
      : []),
  ];
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid gap-5">
      <ErrorSummary key={attempt} items={summary} title="This was not settled yet" />
      {conflict ? <ConflictNotice conflict={conflict} words={() => typed(form.getValues())} /> : null}
      <RadioCards
        legend={`How should ${claimRef} be settled?`}
        columns={2}
        error={errors.word}
        options={[
          {
            value: "correct",
            label: "correct",
            mark: <Mark name="correct" />,
            disabled: correctionHtml === null,
            hint:
              correctionHtml === null ? (
                "Nothing was recomputed, so there is no value to take."
              ) : (
                <>
                  The claim becomes{" "}
                  <span className="text-base text-red">
                    <MathHtml html={correctionHtml} />
                  </span>
                  , and {claimant} is told.
                </>
              ),
          },
          {
            value: "stet",
            label: "stet",
            mark: <Mark name="stet" />,
            hint: "The claimed value stands. Name the convention that it relies on, and the reason.",
          },
          {
            value: "reword",
            label: "reword",
            mark: <Mark name="reword" />,
            hint: `The problem itself changes: ${claimant} writes a new version, and a run has to confirm it.`,
          },
          {
            value: "withdraw",
            label: "withdraw",
            mark: <Mark name="withdraw" />,
            hint: "The claim leaves the key.",
          },
        ]}
        {...form.register("word")}
      />
      {word === "stet" ? (
        <Field
          id="settle-convention"
          label="Convention it relies on"
          hint="Such as: 3j symbols without the factor (−1)^(j1−j2−m3), as in table 4 of the appendix."
          error={errors.convention}
          {...form.register("convention")}
        />
      ) : null}
      {word ? (
        <TextArea
          id="settle-reason"
          rows={3}
          label={REASON[word].label}
          hint={REASON[word].hint}
          optional={REASON[word].optional}
          error={errors.reason}
          {...form.register("reason")}
        />
      ) : null}
      <div className="flex flex-wrap items-center gap-4">
        <Button type="submit" variant="primary" pending={isSubmitting} pendingLabel="Settling">
          {word ? `Settle: ${word}` : "Settle"}
        </Button>
        <p className="font-ui text-xs text-quiet">It can be undone until a key is frozen.</p>
      </div>
    </form>
  );
}

/** What the person has written so far, convention first. */
const typed = ({ convention, reason }: Pick<Values, "convention" | "reason">) =>
  [convention, reason].filter(Boolean).join("\n\n");

/** Somebody was quicker: what they did, with this person's own words kept. */
function ConflictNotice({ conflict, words }: { conflict: Conflict; words: () => string }) {
  const router = useRouter();
  const gone = conflict.state !== "open";
  const show = () => {
    const text = words();
    // The form goes away with the open flag, so what was typed moves to the discussion.
    if (gone && text !== "") offerDraft(text);
    router.refresh();
  };
  return (
    <Notice
      kind="warn"
      live
      title={conflict.message}
      action={
        <Button size="small" onClick={show}>
          Show the flag as it is now
        </Button>
      }
    >
      {conflict.reason ? <p>Their reason: {conflict.reason}</p> : null}
      <p>
        Nothing of yours was saved, and what you typed is still here.
        {gone ? " When you go on, it moves into the box of the discussion below." : ""}
      </p>
    </Notice>
  );
}
