"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { FormProvider, useForm } from "react-hook-form";

import { Button } from "@/components/ui/button";
import { ErrorSummary } from "@/components/ui/error-summary";
import { Checkbox, Field, RadioCards } from "@/components/ui/field";
import { Notice } from "@/components/ui/notice";
import { DEFAULT_CONVENTIONS, type CONVENTION_CHOICES } from "@/lib/verify/conventions";
import { KIND_WORDS, NewWork, WORK_KINDS } from "@/lib/works/schema";
import { ConventionsFields, type Examples } from "../../_components/conventions-fields";
import { showFailure } from "../../_components/show-failure";
import { createWorkAction } from "../actions";

/** The guided sheet of a new work: what it is, and how it prints. */
export function NewWorkForm({
  choices,
  examples,
}: {
  choices: typeof CONVENTION_CHOICES;
  examples: Examples;
}) {
  const form = useForm({
    resolver: zodResolver(NewWork),
    defaultValues: {
      title: "",
      kind: "book" as const,
      confidential: false,
      conventions: { ...DEFAULT_CONVENTIONS, impliedRoot: "false" as const },
    },
  });
  const router = useRouter();
  const { errors, isSubmitting, submitCount } = form.formState;
  const submit = form.handleSubmit(async (given) => {
    const result = await createWorkAction(given);
    if (result.ok) router.push(`/works/${result.data.id}`);
    else showFailure(form, result);
  });
  const kind = form.register("kind", {
    // An exam is confidential unless its lead says otherwise.
    onChange: (event: { target: { value: string } }) => {
      if (!form.formState.dirtyFields.confidential)
        form.setValue("confidential", event.target.value === "exam");
    },
  });
  return (
    <FormProvider {...form}>
      <form onSubmit={submit} noValidate className="grid gap-9">
        {errors.root ? <Notice kind="error" title={errors.root.message} live /> : null}
        {errors.title ? (
          <ErrorSummary key={submitCount} items={[{ field: "title", message: errors.title.message ?? "" }]} />
        ) : null}
        <Field id="title" label="Title" error={errors.title} autoComplete="off" {...form.register("title")} />
        <RadioCards
          legend="What is it?"
          error={errors.kind}
          options={WORK_KINDS.map((value) => ({
            value,
            label: KIND_WORDS[value].name,
            hint: KIND_WORDS[value].hint,
          }))}
          {...kind}
        />
        <Checkbox
          label="Confidential"
          hint="Unpublished exam material: every page of the work says so."
          {...form.register("confidential")}
        />
        <section aria-labelledby="sheet" className="border-t-2 border-ink pt-6">
          <h2 id="sheet" className="text-xl">
            The conventions sheet
          </h2>
          <p className="mt-1 mb-6 text-quiet">
            How the work writes and prints. Claims are read and judged by this sheet, and a frozen key names
            it.
          </p>
          <ConventionsFields choices={choices} examples={examples} />
        </section>
        <div>
          <Button
            type="submit"
            variant="primary"
            size="large"
            pending={isSubmitting}
            pendingLabel="Starting the work"
          >
            Start the work
          </Button>
        </div>
      </form>
    </FormProvider>
  );
}
