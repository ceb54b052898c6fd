import { openApi } from "@/lib/check/openapi";

export const dynamic = "force-static";

/** The description of /api/v1 in OpenAPI 3.1. */
export function GET(): Response {
  return Response.json(openApi());
}
