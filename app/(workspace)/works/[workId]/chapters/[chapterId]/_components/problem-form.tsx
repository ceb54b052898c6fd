"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useId, useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import type { z } from "zod";

import { Button } from "@/components/ui/button";
import { ErrorSummary } from "@/components/ui/error-summary";
import { Field, TextArea } from "@/components/ui/field";
import { Notice } from "@/components/ui/notice";
import { useToast } from "@/components/ui/toast";
import type { StoredProblem } from "@/lib/problems/edit-problem";
import { PROBLEM_LIMITS, ProblemText } from "@/lib/problems/schema";
import { dropDraft, keepDraft, readDraft } from "../../../claims/_components/use-draft";
import { addProblemAction, editProblemAction } from "../../actions";

type Typed = z.input<typeof ProblemText>;
const FIELDS = ["label", "statement"] as const;

export type ProblemTarget =
  | { kind: "new"; chapterId: string }
  | { kind: "edit"; problemId: string; version: number; label: string; statement: string };

/** A problem's label and statement. What was typed survives a failed save, a conflict and a reload. */
export function ProblemForm({
  workId,
  target,
  onDone,
  onCancel,
}: {
  workId: string;
  target: ProblemTarget;
  onDone: (label: string) => void;
  onCancel: () => void;
}) {
  const id = useId();
  const say = useToast();
  const draftKey = target.kind === "new" ? `problem-of-${target.chapterId}` : `problem-${target.problemId}`;
  const [start] = useState<Typed>(() => ({
    ...(target.kind === "new"
      ? { label: "", statement: "" }
      : { label: target.label, statement: target.statement }),
    ...readDraft<Typed>(draftKey),
  }));
  const [version, setVersion] = useState(target.kind === "edit" ? target.version : 0);
  const [stored, setStored] = useState<StoredProblem | null>(null);
  const [failure, setFailure] = useState<string | null>(null);
  const [attempt, setAttempt] = useState(0);
  const form = useForm<Typed, unknown, ProblemText>({
    resolver: zodResolver(ProblemText),
    defaultValues: start,
    shouldFocusError: false,
  });
  const { errors, isSubmitting } = form.formState;
  const length = useWatch({ control: form.control, name: "statement" })?.length ?? 0;
  const keep = () => keepDraft(draftKey, form.getValues());

  const send = (values: ProblemText, against: number) =>
    target.kind === "new"
      ? addProblemAction({ ...values, workId, chapterId: target.chapterId })
      : editProblemAction({ ...values, workId, problemId: target.problemId, version: against });

  async function save(values: ProblemText, against: number) {
    setFailure(null);
    keep();
    const result = await send(values, against).catch(() => null);
    if (result === null) {
      setFailure(
        "The server could not be reached. What you typed is kept here; save again when the line is back.",
      );
    } else if (result.ok) {
      dropDraft(draftKey);
      say(`Problem ${values.label} is saved.`);
      onDone(values.label);
      return;
    } else if (result.code === "conflict" && result.details?.stored) {
      setStored(result.details.stored as StoredProblem);
      return;
    } else {
      for (const name of FIELDS)
        if (result.fields?.[name]) form.setError(name, { message: result.fields[name][0] });
      if (!FIELDS.some((name) => result.fields?.[name])) setFailure(result.message);
    }
    setAttempt((count) => count + 1);
  }

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
      noValidate
      onSubmit={(event) => void submit(version)(event)}
      aria-label={target.kind === "new" ? "New problem" : `Problem ${target.label}`}
      className="grid gap-4 border-y border-blue bg-sheet py-5"
    >
      <ErrorSummary key={attempt} items={summary} />
      {stored ? (
        <Notice
          kind="warn"
          live
          title="Somebody changed this problem while you were writing"
          action={
            <>
              <Button
                size="small"
                variant="blue"
                onClick={() => {
                  setVersion(stored.version);
                  void submit(stored.version)();
                  setStored(null);
                }}
              >
                Save mine over it
              </Button>
              <Button
                size="small"
                onClick={() => {
                  form.reset({ label: stored.label, statement: stored.statement });
                  setVersion(stored.version);
                  setStored(null);
                  dropDraft(draftKey);
                }}
              >
                Take what is stored
              </Button>
            </>
          }
        >
          <p>Nothing of yours was saved or lost. Stored now, as problem {stored.label}:</p>
          <p className="mt-1 font-mono text-xs break-words whitespace-pre-wrap">
            {stored.statement || "(no statement)"}
          </p>
        </Notice>
      ) : null}
      <Field
        id={`${id}-label`}
        label="Label"
        hint="As it is printed, such as 7.3."
        className="max-w-44"
        autoComplete="off"
        autoFocus
        error={errors.label}
        {...form.register("label", { onChange: keep })}
      />
      <TextArea
        id={`${id}-statement`}
        label="Statement"
        optional
        hint="Prose in LaTeX; formulas between dollar signs are typeset."
        rows={5}
        spellCheck
        error={errors.statement}
        {...form.register("statement", { onChange: keep })}
      />
      <p className="tabular -mt-2 font-ui text-xs text-quiet">{`${length.toLocaleString("en-GB")} of ${PROBLEM_LIMITS.statement.toLocaleString("en-GB")} characters`}</p>
      <div className="flex flex-wrap gap-3">
        <Button type="submit" variant="primary" pending={isSubmitting} pendingLabel="Saving">
          Save problem
        </Button>
        <Button
          onClick={() => {
            dropDraft(draftKey);
            onCancel();
          }}
        >
          {target.kind === "new" ? "Close" : "Leave as it was"}
        </Button>
      </div>
    </form>
  );
}
