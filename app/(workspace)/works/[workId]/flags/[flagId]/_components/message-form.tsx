"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useEffect } from "react";
import { useForm } from "react-hook-form";
import type { z } from "zod";

import { Button } from "@/components/ui/button";
import { TextArea } from "@/components/ui/field";
import { AddMessage } from "@/lib/flags/schema";
import { addMessageAction } from "../actions";
import { onDraft } from "./draft";

type Values = z.input<typeof AddMessage>;

/** A note to the others. It is emptied only after it has been saved. */
export function MessageForm({ workId, flagId }: { workId: string; flagId: string }) {
  const form = useForm<Values, unknown, AddMessage>({
    resolver: zodResolver(AddMessage),
    defaultValues: { workId, flagId, body: "" },
  });
  const { errors, isSubmitting } = form.formState;
  const { getValues, setValue } = form;
  useEffect(
    () =>
      onDraft((text) => {
        const written = getValues("body");
        setValue("body", written ? `${written}\n\n${text}` : text);
      }),
    [getValues, setValue],
  );
  const submit = form.handleSubmit(async (values) => {
    const result = await addMessageAction(values);
    if (result.ok) form.reset({ workId, flagId, body: "" });
    else form.setError("body", { message: result.fields?.body?.[0] ?? result.message });
  });
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid gap-3">
      <TextArea
        label="Your note"
        hint="Formulas between dollar signs are typeset: $\sqrt{2/15}$."
        rows={3}
        error={errors.body}
        {...form.register("body")}
      />
      <div>
        <Button type="submit" variant="blue" pending={isSubmitting} pendingLabel="Adding">
          Add to the discussion
        </Button>
      </div>
    </form>
  );
}
