import type { FieldValues, Path, UseFormReturn } from "react-hook-form";

import type { Failure } from "@/lib/errors";

/** Writes what the server said of a form under the fields it concerns, or at its head. */
export function showFailure<In extends FieldValues, C, Out>(
  form: UseFormReturn<In, C, Out>,
  failure: Failure,
): void {
  const fields = Object.entries(failure.fields ?? {}).filter(([name]) => name in form.getValues());
  for (const [name, [message]] of fields)
    form.setError(name as Path<In>, { message: message ?? failure.message });
  if (fields.length === 0) form.setError("root", { message: failure.message });
  else form.setFocus(fields[0]?.[0] as Path<In>);
}
