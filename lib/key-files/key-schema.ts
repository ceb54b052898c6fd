import { z } from "zod";
import { BUDGET } from "@/lib/verify/budget";
import { KEY_FILE_LIMITS } from "./key-file";

const asString = (name: string, example: string) => ({
  error: (issue: { input?: unknown }) =>
    issue.input === undefined
      ? `“${name}” is missing.`
      : typeof issue.input === "number"
        ? `“${name}” is a number here; write it as a string, such as ${example}, so that no digit is lost.`
        : `“${name}” must be a string, such as ${example}.`,
});

const text = (name: string, example: string, most: number) =>
  z
    .string(asString(name, example))
    .min(1, `“${name}” is empty.`)
    .max(most, `“${name}” has more than ${most.toLocaleString("en-GB")} characters.`);

const optionalText = (name: string) =>
  z
    .string(asString(name, '"p. 12"'))
    .max(
      KEY_FILE_LIMITS.cell,
      `“${name}” has more than ${KEY_FILE_LIMITS.cell.toLocaleString("en-GB")} characters.`,
    )
    .optional();

const oneOf = <const T extends readonly [string, ...string[]]>(name: string, values: T) =>
  z
    .enum(values, { error: `“${name}” is one of ${values.map((value) => `"${value}"`).join(", ")}.` })
    .optional();

/** The conventions that a key may state; what it leaves out is taken from the work, or from the defaults. */
export const ConventionsInput = z
  .strictObject(
    {
      cgOrder: oneOf("cgOrder", ["j1m1j2m2", "j1j2m1m2"]),
      phase: oneOf("phase", ["condon-shortley"]),
      houseForm: oneOf("houseForm", ["any", "rationalised", "single-root", "root-below", "signed-square"]),
      impliedRoot: z.boolean({ error: "“impliedRoot” is true or false." }).optional(),
      decimalMark: oneOf("decimalMark", [".", ","]),
    },
    {
      error: (issue) =>
        issue.code === "unrecognized_keys"
          ? `The convention ${issue.keys.map((key) => `“${key}”`).join(", ")} is not known.`
          : "“conventions” must be an object.",
    },
  )
  .meta({ id: "Conventions", description: "Notation of the key; each may be left out." });

export const ClaimInput = z
  .strictObject(
    {
      ref: text("ref", '"7.3(a)"', 200).meta({ description: "The claim's own label.", examples: ["7.3(a)"] }),
      quantity: text("quantity", '"(1 1 2; 0 0 0)"', BUDGET.text).meta({
        description: "The quantity in typed notation.",
        examples: ["(1 1 2; 0 0 0)", "<1 0 1 0 | 2 0>"],
      }),
      claimed: text("claimed", '"sqrt(2/15)"', BUDGET.text).meta({
        description: "The claimed value in typed notation.",
        examples: ["sqrt(2/15)", "-1/2", "0.3651"],
      }),
      note: optionalText("note"),
      problem: optionalText("problem"),
      page: optionalText("page"),
    },
    {
      error: (issue) =>
        issue.code === "unrecognized_keys"
          ? `A claim has no ${issue.keys.map((key) => `“${key}”`).join(", ")}.`
          : "A claim must be an object with ref, quantity and claimed.",
    },
  )
  .meta({ id: "Claim", description: "One answer: a quantity and the value claimed for it." });

/** The JSON key: a fixed contract of files, the command line and the HTTP interface. */
export const keySchema = (mostClaims: number) =>
  z
    .strictObject(
      {
        conventions: ConventionsInput.optional(),
        claims: z
          .array(ClaimInput, {
            error: (issue) =>
              issue.input === undefined ? "“claims” is missing." : "“claims” must be a list.",
          })
          .min(1, "“claims” is empty.")
          .max(mostClaims, `There are more than ${mostClaims.toLocaleString("en-GB")} claims.`),
      },
      {
        error: (issue) =>
          issue.code === "unrecognized_keys"
            ? `A key has no ${issue.keys.map((key) => `“${key}”`).join(", ")}; it has conventions and claims.`
            : "A key must be an object with conventions and claims.",
      },
    )
    .meta({ id: "Key", description: "An answer key." });
export type KeyInput = z.output<ReturnType<typeof keySchema>>;
