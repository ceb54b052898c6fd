"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useState } from "react";
import { useForm } from "react-hook-form";
import { z } from "zod";

import { Button } from "@/components/ui/button";
import { Disclosure } from "@/components/ui/disclosure";
import { ErrorSummary } from "@/components/ui/error-summary";
import { Field } from "@/components/ui/field";
import { signInHere } from "../../_lib/sign-in-here";

const SignIn = z.object({
  email: z.string().trim().min(1, "Give your e-mail address."),
  password: z.string().min(1, "Give your password."),
});

type DemoPerson = { name: string; email: string; password: string; role: string };

/** The form of the front door. `next` was checked by the server to be a path of this site. */
export function SignInForm({ next, demo }: { next: string; demo: readonly DemoPerson[] }) {
  const form = useForm({ resolver: zodResolver(SignIn), defaultValues: { email: "", password: "" } });
  const [refusal, setRefusal] = useState<{ at: number; message: string } | null>(null);
  const { errors, isSubmitting } = form.formState;
  const submit = form.handleSubmit(async (given) => {
    setRefusal(null);
    const outcome = await signInHere(given);
    if (outcome.ok) return window.location.assign(next);
    setRefusal((last) => ({ at: (last?.at ?? 0) + 1, message: outcome.message }));
    form.resetField("password");
  });
  return (
    <>
      <form onSubmit={submit} noValidate className="grid gap-5" method="post">
        {refusal ? (
          <ErrorSummary
            key={refusal.at}
            title="You are not signed in"
            items={[{ field: "email", message: refusal.message }]}
          />
        ) : null}
        <Field
          id="email"
          label="E-mail address"
          type="email"
          autoComplete="username"
          error={errors.email}
          {...form.register("email")}
        />
        <Field
          id="password"
          label="Password"
          type="password"
          autoComplete="current-password"
          error={errors.password}
          {...form.register("password")}
        />
        <div>
          <Button
            type="submit"
            variant="primary"
            size="large"
            pending={isSubmitting}
            pendingLabel="Signing in"
          >
            Sign in
          </Button>
        </div>
      </form>
      {demo.length > 0 ? (
        <div className="mt-7">
          <Disclosure summary="People of the demo work" open>
            <ul className="grid gap-2">
              {demo.map((person) => (
                <li
                  key={person.email}
                  className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1"
                >
                  <span>
                    {person.name}, <span className="text-quiet">{person.role}</span>
                  </span>
                  <Button
                    size="small"
                    aria-label={`Sign in as ${person.name}`}
                    onClick={() => {
                      form.setValue("email", person.email);
                      form.setValue("password", person.password);
                      void submit();
                    }}
                  >
                    Sign in
                  </Button>
                </li>
              ))}
            </ul>
          </Disclosure>
        </div>
      ) : null}
    </>
  );
}
