import type { ReactNode } from "react";
import { useFormContext } from "react-hook-form";

import { RadioCards } from "@/components/ui/field";
import type { CONVENTION_CHOICES, Conventions } from "@/lib/verify/conventions";

/** What the server set for each option, by question and value: formulas are typeset there. */
export type Examples = Record<string, Record<string, ReactNode>>;

type Choices = typeof CONVENTION_CHOICES;

/** The questions of a conventions sheet, each answered by how the work prints one thing. */
export function ConventionsFields({
  choices,
  examples,
  disabled = false,
}: {
  choices: Choices;
  examples: Examples;
  disabled?: boolean;
}) {
  const { register, formState } = useFormContext<{ conventions: Record<keyof Conventions, string> }>();
  const errors = formState.errors.conventions;
  return (
    <div className="grid gap-9">
      {choices.map(({ id, question, help, options }) => (
        <RadioCards
          key={id}
          legend={question}
          hint={help}
          columns={options.length % 2 === 0 ? 2 : 1}
          error={errors?.[id]}
          options={options.map((option) => ({
            value: option.value,
            label: option.label,
            disabled,
            hint: (
              <span className="mt-1.5 flex flex-wrap items-center gap-x-4 gap-y-1">
                <span className="text-base text-ink">{examples[id]?.[option.value]}</span>
                <code className="font-mono text-xs">{option.example}</code>
              </span>
            ),
          }))}
          {...register(`conventions.${id}`)}
        />
      ))}
    </div>
  );
}
