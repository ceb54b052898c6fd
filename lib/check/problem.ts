import { problemResponse } from "@/lib/http";
import { AppError } from "@/lib/errors";

/**
 * A fault of a request as problem details whose `errors` list carries JSON Pointers, as clients of the interface expect it.
 * Everything else is answered as everywhere.
 */
export async function problemOf(error: unknown, request: Request): Promise<Response> {
  const response = problemResponse(error, new URL(request.url).pathname);
  if (!(error instanceof AppError) || !Array.isArray(error.details?.errors)) return response;
  const { details, ...problem } = (await response.json()) as Record<string, unknown> & {
    details: { errors: unknown };
  };
  return new Response(JSON.stringify({ ...problem, errors: details.errors }), {
    status: response.status,
    headers: response.headers,
  });
}
