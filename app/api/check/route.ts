import { getUser } from "@/lib/auth/session";
import { answerClaim, LIVE_LIMITS, LiveClaim } from "@/lib/check/answer-claim";
import { countLiveCheck } from "@/lib/check/check-limit";
import { readJson, route } from "@/lib/http";

export const dynamic = "force-dynamic";

/** The live form and the front page: one claim in, its finding typeset for the page out. */
export const POST = route(async (request) => {
  const user = await getUser();
  await countLiveCheck(request, user?.id ?? null);
  const claim = await readJson(request, LiveClaim, LIVE_LIMITS.bytes);
  return Response.json(answerClaim(claim), { headers: { "cache-control": "no-store" } });
});
