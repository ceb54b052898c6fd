import { answerKey } from "@/lib/check/answer-key";
import { countKeyCheck } from "@/lib/check/check-limit";
import { problemOf } from "@/lib/check/problem";
import { route } from "@/lib/http";

export const dynamic = "force-dynamic";

/** An answer key in, the JSON report of the command line out. Needs no account; limited by address. */
export const POST = route(async (request) => {
  try {
    await countKeyCheck(request);
    return Response.json(await answerKey(request), { headers: { "cache-control": "no-store" } });
  } catch (error) {
    return problemOf(error, request);
  }
});
