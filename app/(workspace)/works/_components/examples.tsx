import { Math } from "@/components/math";
import { CONVENTION_CHOICES } from "@/lib/verify/conventions";
import type { Examples } from "./conventions-fields";

/** The example of every option, typeset on the server. */
export const conventionExamples = (): Examples =>
  Object.fromEntries(
    CONVENTION_CHOICES.map(({ id, options }) => [
      id,
      Object.fromEntries(options.map(({ value, latex }) => [value, <Math key={value} latex={latex} />])),
    ]),
  );
