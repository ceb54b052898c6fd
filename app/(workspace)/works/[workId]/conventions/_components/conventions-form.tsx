"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { FormProvider, useForm } from "react-hook-form";

import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Notice } from "@/components/ui/notice";
import { useToast } from "@/components/ui/toast";
import type { CONVENTION_CHOICES, Conventions } from "@/lib/verify/conventions";
import { ConventionsChange } from "@/lib/works/schema";
import { ConventionsFields, type Examples } from "../../../_components/conventions-fields";
import { showFailure } from "../../../_components/show-failure";
import { changeConventionsAction } from "../actions";

/** Changes the sheet. Before it is saved it says what that undoes. */
export function ConventionsForm({
  workId,
  version,
  conventions,
  judged,
  choices,
  examples,
}: {
  workId: string;
  version: number;
  conventions: Conventions;
  judged: number;
  choices: typeof CONVENTION_CHOICES;
  examples: Examples;
}) {
  const form = useForm({
    resolver: zodResolver(ConventionsChange),
    defaultValues: {
      workId,
      version,
      conventions: {
        ...conventions,
        impliedRoot: conventions.impliedRoot ? ("true" as const) : ("false" as const),
      },
    },
  });
  const [asking, setAsking] = useState(false);
  const say = useToast();
  const router = useRouter();
  const { errors, isDirty, isSubmitting } = form.formState;
  const save = form.handleSubmit(async (given) => {
    const result = await changeConventionsAction(given);
    setAsking(false);
    if (!result.ok) return showFailure(form, result);
    say(`Version ${result.data.version} of the sheet is in force. ${dueWords(result.data.due)}`);
    router.refresh();
  });
  const ask = (event: { preventDefault: () => void }) => {
    event.preventDefault();
    if (judged === 0) void save();
    else setAsking(true);
  };
  return (
    <FormProvider {...form}>
      <form onSubmit={ask} noValidate className="grid gap-9">
        {errors.root ? (
          <Notice
            kind="error"
            title={errors.root.message}
            live
            action={
              <Button size="small" onClick={() => router.refresh()}>
                Show the sheet in force
              </Button>
            }
          />
        ) : null}
        <ConventionsFields choices={choices} examples={examples} />
        <div className="flex flex-wrap items-center gap-4">
          <Button
            type="submit"
            variant="primary"
            disabled={!isDirty}
            pending={isSubmitting}
            pendingLabel="Saving"
          >
            Save the sheet
          </Button>
          <p className="font-ui text-sm text-quiet">
            {isDirty ? `This becomes version ${version + 1}.` : "Nothing is changed yet."}
          </p>
        </div>
      </form>
      <Dialog
        open={asking}
        onClose={() => setAsking(false)}
        title="Every verdict becomes due again"
        footer={
          <>
            <Button onClick={() => setAsking(false)}>Keep the sheet as it is</Button>
            <Button
              variant="primary"
              pending={isSubmitting}
              pendingLabel="Saving"
              onClick={() => void save()}
            >
              Save as version {version + 1}
            </Button>
          </>
        }
      >
        <p>
          {judged === 1 ? "One claim was" : `${judged.toLocaleString("en-GB")} claims were`} judged by version{" "}
          {version}. Under another sheet a value may be right that was wrong, or the other way round, so{" "}
          {judged === 1 ? "it counts" : "all of them count"} as not checked until a run has judged{" "}
          {judged === 1 ? "it" : "them"} again. A run that is going is cancelled. Frozen keys stay as they
          are, with the sheet they name.
        </p>
      </Dialog>
    </FormProvider>
  );
}

const dueWords = (due: number) =>
  due === 0
    ? ""
    : due === 1
      ? "One claim is due for a run."
      : `${due.toLocaleString("en-GB")} claims are due for a run.`;
