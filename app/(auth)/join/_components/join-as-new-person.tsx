"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useState } from "react";
import { useForm } from "react-hook-form";

import { Button } from "@/components/ui/button";
import { ErrorSummary, type SummaryItem } from "@/components/ui/error-summary";
import { Field } from "@/components/ui/field";
import { NewPerson } from "@/lib/people/password-schema";
import { signInHere } from "../../_lib/sign-in-here";
import { acceptAsNewPersonAction } from "../actions";

/** Somebody new: a name and a password make the account, and they are signed in at once. */
export function JoinAsNewPerson({ token, email }: { token: string; email: string | null }) {
  const form = useForm({
    resolver: zodResolver(NewPerson),
    defaultValues: { token, name: "", password: "", email: email ?? undefined },
  });
  const [refusal, setRefusal] = useState<{ at: number; items: SummaryItem[] } | null>(null);
  const { errors, isSubmitting } = form.formState;
  const submit = form.handleSubmit(async (given) => {
    setRefusal(null);
    const result = await acceptAsNewPersonAction(email ? { ...given, email: undefined } : given);
    if (!result.ok) {
      const fields = Object.entries(result.fields ?? {}).flatMap(([field, said]) =>
        said.map((message) => ({ field, message })),
      );
      return setRefusal((last) => ({
        at: (last?.at ?? 0) + 1,
        items: fields.length > 0 ? fields : [{ message: result.message }],
      }));
    }
    const signedIn = await signInHere({ email: result.data.email, password: given.password });
    window.location.assign(
      signedIn.ok ? result.data.path : `/sign-in?next=${encodeURIComponent(result.data.path)}`,
    );
  });
  return (
    <form onSubmit={submit} noValidate method="post" className="grid gap-5">
      {refusal ? <ErrorSummary key={refusal.at} title="Not accepted yet" items={refusal.items} /> : null}
      {email ? (
        <Field
          label="E-mail address"
          type="email"
          value={email}
          readOnly
          autoComplete="username"
          hint="The address the invitation was sent to."
        />
      ) : (
        <Field
          id="email"
          label="E-mail address"
          type="email"
          autoComplete="username"
          error={errors.email}
          {...form.register("email")}
        />
      )}
      <Field
        id="name"
        label="Your name"
        hint="As it should be printed beside what you write and settle."
        autoComplete="name"
        error={errors.name}
        {...form.register("name")}
      />
      <Field
        id="password"
        label="Choose a password"
        hint="At least 12 characters, better 15 or more. A few unrelated words do well; no special characters are needed."
        type="password"
        autoComplete="new-password"
        error={errors.password}
        {...form.register("password")}
      />
      <div>
        <Button type="submit" variant="primary" size="large" pending={isSubmitting} pendingLabel="Joining">
          Accept the invitation
        </Button>
      </div>
    </form>
  );
}
