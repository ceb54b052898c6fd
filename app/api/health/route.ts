import { health } from "@/lib/health";

export const dynamic = "force-dynamic";

/** 200 when the database and Redis answer, 503 with the reasons otherwise. */
export async function GET(): Promise<Response> {
  const state = await health();
  return Response.json(state, { status: state.ok ? 200 : 503 });
}
