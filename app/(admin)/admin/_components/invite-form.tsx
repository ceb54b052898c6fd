"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";

import { Button } from "@/components/ui/button";
import { Field, Select } from "@/components/ui/field";
import { Notice } from "@/components/ui/notice";
import { useToast } from "@/components/ui/toast";
import { SiteInvitation } from "@/lib/people/schema";
import { inviteToSiteAction } from "../actions";

/** Invites somebody to the site itself, without a work. */
export function InviteForm() {
  const form = useForm({
    resolver: zodResolver(SiteInvitation),
    defaultValues: { email: "", role: "person" as const },
  });
  const say = useToast();
  const { errors, isSubmitting } = form.formState;
  const submit = form.handleSubmit(async (given) => {
    const result = await inviteToSiteAction(given);
    if (result.ok) {
      say(`An invitation to ${given.email} is on its way.`);
      return form.reset();
    }
    if (result.fields?.email) form.setError("email", { message: result.fields.email[0] ?? result.message });
    else form.setError("root", { message: result.message });
  });
  return (
    <form
      onSubmit={submit}
      noValidate
      className="grid items-start gap-4 sm:grid-cols-[minmax(0,2fr)_minmax(0,1fr)_auto]"
    >
      <Field
        label="E-mail address"
        type="email"
        autoComplete="off"
        error={errors.email}
        {...form.register("email")}
      />
      <Select
        label="They may"
        error={errors.role}
        options={[
          { value: "person", label: "start works" },
          { value: "administrator", label: "administer the site" },
        ]}
        {...form.register("role")}
      />
      <Button
        type="submit"
        variant="primary"
        pending={isSubmitting}
        pendingLabel="Inviting"
        className="sm:mt-7"
      >
        Invite
      </Button>
      {errors.root ? (
        <Notice kind="error" title={errors.root.message} live className="sm:col-span-3" />
      ) : null}
    </form>
  );
}
