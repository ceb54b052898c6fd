import { z } from "zod";
import { readBytes } from "@/lib/http";
import { AppError } from "@/lib/errors";
import { decodeKeyFile } from "@/lib/key-files/decode";
import { parseKey, withoutHoles } from "@/lib/key-files/json";
import { UnusableFile, type KeyFileError } from "@/lib/key-files/key-file";
import { verifyKey } from "@/lib/verify/verify-key";
import { publicReport } from "./report-json";

/** Limits of one request over HTTP; a longer key is checked by upload or by the command line. */
export const REQUEST_LIMITS = { claims: 200, bytes: 256 * 1024, largestJ: 200 } as const;

/**
 * The answer to a key sent over HTTP: the JSON that the command line gives.
 * @throws AppError too_large, or invalid with an entry in `details.errors` (JSON Pointer, line, column) for each fault
 */
export async function answerKey(request: Request): Promise<ReturnType<typeof publicReport>> {
  const bytes = await readBytes(request, REQUEST_LIMITS.bytes);
  const { key, errors } = parsed(bytes);
  if (!key) throw faulty(errors);
  const conventions = withoutHoles(key.conventions);
  return publicReport(verifyKey({ conventions, claims: key.claims }, { largestJ: REQUEST_LIMITS.largestJ }));
}

function parsed(bytes: Uint8Array): ReturnType<typeof parseKey> {
  try {
    return parseKey(decodeKeyFile(bytes).text, REQUEST_LIMITS.claims);
  } catch (error) {
    if (error instanceof UnusableFile) throw faulty([error.at]);
    throw error;
  }
}

/** Errors of a key by JSON Pointer. */
export const PointerError = z.object({
  pointer: z
    .string()
    .meta({ description: "RFC 6901 JSON Pointer of the value at fault; empty for the whole body." }),
  detail: z.string(),
  line: z.number().int(),
  column: z.number().int(),
});

function faulty(errors: readonly KeyFileError[]): AppError {
  const [first] = errors;
  const more = errors.length > 1 ? ` (and ${errors.length - 1} more)` : "";
  return new AppError("invalid", `${first?.says ?? "The body is not a key."}${more}`, {
    details: {
      errors: errors
        .slice(0, 50)
        .map(({ pointer, says, line, column }) => ({ pointer: pointer ?? "", detail: says, line, column })),
    },
  });
}
