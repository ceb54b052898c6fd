"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useState } from "react";
import { useForm } from "react-hook-form";
import { z } from "zod";

import { Button } from "@/components/ui/button";
import { ErrorSummary } from "@/components/ui/error-summary";
import { Field } from "@/components/ui/field";
import { signInHere } from "../../_lib/sign-in-here";
import { acceptSignedInAction } from "../actions";

const Given = z.object({ password: z.string().min(1, "Give your password.") });

/** Somebody whose address has an account: the password, then the invitation is accepted. */
export function SignInToJoin({ token, email }: { token: string; email: string }) {
  const form = useForm({ resolver: zodResolver(Given), defaultValues: { password: "" } });
  const [refusal, setRefusal] = useState<{ at: number; message: string } | null>(null);
  const submit = form.handleSubmit(async ({ password }) => {
    setRefusal(null);
    const signedIn = await signInHere({ email, password });
    const result = signedIn.ok ? await acceptSignedInAction({ token }) : signedIn;
    if (!result.ok) return setRefusal((last) => ({ at: (last?.at ?? 0) + 1, message: result.message }));
    if ("data" in result) window.location.assign(result.data.path);
  });
  return (
    <form onSubmit={submit} noValidate method="post" className="grid gap-5">
      {refusal ? (
        <ErrorSummary
          key={refusal.at}
          title="Not accepted yet"
          items={[{ field: "password", message: refusal.message }]}
        />
      ) : null}
      <p>This address has an account already. Sign in to accept the invitation.</p>
      <Field label="E-mail address" type="email" value={email} readOnly autoComplete="username" />
      <Field
        id="password"
        label="Password"
        type="password"
        autoComplete="current-password"
        error={form.formState.errors.password}
        {...form.register("password")}
      />
      <div>
        <Button
          type="submit"
          variant="primary"
          size="large"
          pending={form.formState.isSubmitting}
          pendingLabel="Joining"
        >
          Sign in and accept
        </Button>
      </div>
    </form>
  );
}
