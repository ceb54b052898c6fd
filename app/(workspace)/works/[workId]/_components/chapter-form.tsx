"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";

import { Button } from "@/components/ui/button";
import { Field } from "@/components/ui/field";
import { Notice } from "@/components/ui/notice";
import type { Result } from "@/lib/action";
import { NewChapter } from "@/lib/chapters/schema";
import { showFailure } from "../../_components/show-failure";

/** Number and title of a chapter, new or known. */
export function ChapterForm({
  workId,
  initial,
  label,
  save,
  onDone,
}: {
  workId: string;
  initial: { number: number; title: string };
  label: string;
  save: (given: NewChapter) => Promise<Result<unknown>>;
  onDone: () => void;
}) {
  const form = useForm({ resolver: zodResolver(NewChapter), defaultValues: { workId, ...initial } });
  const { errors, isSubmitting } = form.formState;
  const submit = form.handleSubmit(async (given) => {
    const result = await save(given);
    if (result.ok) onDone();
    else showFailure(form, result);
  });
  return (
    <form onSubmit={submit} noValidate className="grid gap-5 text-left">
      {errors.root ? <Notice kind="error" title={errors.root.message} live /> : null}
      <div className="grid gap-5 sm:grid-cols-[8rem_minmax(0,1fr)]">
        <Field
          label="Number"
          hint="as printed"
          type="number"
          inputMode="numeric"
          min={0}
          error={errors.number}
          {...form.register("number", { valueAsNumber: true })}
        />
        <Field label="Title" hint="without the number" error={errors.title} {...form.register("title")} />
      </div>
      <div>
        <Button type="submit" variant="primary" pending={isSubmitting} pendingLabel="Saving">
          {label}
        </Button>
      </div>
    </form>
  );
}
