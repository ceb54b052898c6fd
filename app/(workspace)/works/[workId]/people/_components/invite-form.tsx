"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { FormProvider, useForm } from "react-hook-form";

import { Button } from "@/components/ui/button";
import { Field } from "@/components/ui/field";
import { Notice } from "@/components/ui/notice";
import { useToast } from "@/components/ui/toast";
import { NewInvitation } from "@/lib/people/schema";
import { showFailure } from "../../../_components/show-failure";
import { invitePersonAction } from "../actions";
import { RoleFields } from "./role-fields";

/** Invites one address; the form is ready for the next at once, with the same role. */
export function InviteForm({
  workId,
  chapters,
}: {
  workId: string;
  chapters: readonly { id: string; label: string }[];
}) {
  const form = useForm({
    resolver: zodResolver(NewInvitation),
    defaultValues: { workId, email: "", role: "author" as const, chapterIds: null },
  });
  const say = useToast();
  const router = useRouter();
  const { errors, isSubmitting } = form.formState;
  const submit = form.handleSubmit(async (given) => {
    const result = await invitePersonAction(given);
    if (!result.ok) return showFailure(form, result);
    say(`An invitation to ${given.email} is on its way.`);
    form.resetField("email");
    form.setFocus("email");
    router.refresh();
  });
  return (
    <FormProvider {...form}>
      <form onSubmit={submit} noValidate className="grid max-w-sheet gap-6">
        {errors.root ? <Notice kind="error" title={errors.root.message} live /> : null}
        <Field
          label="E-mail address"
          hint="They get a link that works once, for seven days."
          type="email"
          autoComplete="off"
          error={errors.email}
          {...form.register("email")}
        />
        <RoleFields chapters={chapters} />
        <div>
          <Button type="submit" variant="primary" pending={isSubmitting} pendingLabel="Inviting">
            Send the invitation
          </Button>
        </div>
      </form>
    </FormProvider>
  );
}
