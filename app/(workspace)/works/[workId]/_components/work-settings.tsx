"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { useForm } from "react-hook-form";

import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Checkbox, Field, RadioCards } from "@/components/ui/field";
import { Notice } from "@/components/ui/notice";
import { useToast } from "@/components/ui/toast";
import { KIND_WORDS, WORK_KINDS, WorkChange } from "@/lib/works/schema";
import { showFailure } from "../../_components/show-failure";
import { changeWorkAction } from "../actions";

type Facts = { id: string; title: string; kind: WorkChange["kind"]; confidential: boolean };

/** Title, kind and confidentiality, for the lead. */
export function WorkSettings({ work }: { work: Facts }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button onClick={() => setOpen(true)}>Change the work</Button>
      <Dialog open={open} onClose={() => setOpen(false)} title="Change the work">
        <SettingsForm work={work} onDone={() => setOpen(false)} />
      </Dialog>
    </>
  );
}

function SettingsForm({ work: { id, ...facts }, onDone }: { work: Facts; onDone: () => void }) {
  const form = useForm({ resolver: zodResolver(WorkChange), defaultValues: { workId: id, ...facts } });
  const say = useToast();
  const router = useRouter();
  const { errors, isSubmitting } = form.formState;
  const submit = form.handleSubmit(async (given) => {
    const result = await changeWorkAction(given);
    if (!result.ok) return showFailure(form, result);
    onDone();
    say("Saved.");
    router.refresh();
  });
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      {errors.root ? <Notice kind="error" title={errors.root.message} live /> : null}
      <Field label="Title" error={errors.title} {...form.register("title")} />
      <RadioCards
        legend="Kind"
        error={errors.kind}
        options={WORK_KINDS.map((kind) => ({
          value: kind,
          label: KIND_WORDS[kind].name,
          hint: KIND_WORDS[kind].hint,
        }))}
        {...form.register("kind")}
      />
      <Checkbox
        label="Confidential"
        hint="Each page of the work says so."
        {...form.register("confidential")}
      />
      <div>
        <Button type="submit" variant="primary" pending={isSubmitting} pendingLabel="Saving">
          Save
        </Button>
      </div>
    </form>
  );
}
