import { getUser } from "@/lib/auth/session";
import { AppError, notFound } from "@/lib/errors";
import { FlagQuery } from "@/lib/flags/flag-query";
import { listFlags } from "@/lib/flags/list-flags";
import { route } from "@/lib/http";
import { z } from "zod";

type Context = { params: Promise<{ workId: string }> };

/** A page of the review queue as JSON, for the page that keeps itself fresh. */
export const GET = route(async (request: Request, { params }: Context) => {
  const user = await getUser();
  const workId = z.uuid().safeParse((await params).workId);
  if (!user || !workId.success) throw notFound();
  const query = readQuery(new URL(request.url).searchParams);
  const list = await listFlags(workId.data, query, user);
  return Response.json(list, { headers: { "cache-control": "no-store" } });
});

/** @throws AppError invalid naming the parts of the address that make no sense, such as one given twice */
function readQuery(params: URLSearchParams): FlagQuery {
  const fields: Record<string, string[]> = {};
  const given: Record<string, string> = {};
  for (const [name, value] of params) {
    if (name in given) (fields[name] ??= []).push("Given more than once");
    else if (value !== "") given[name] = value;
  }
  const read = z.strictObject(FlagQuery.shape).safeParse(given);
  if (read.success && Object.keys(fields).length === 0) return read.data;
  for (const issue of read.error?.issues ?? [])
    (fields[String(issue.path[0] ?? "query")] ??= []).push(issue.message);
  throw new AppError("invalid", "The address asks for something the queue does not know.", { fields });
}
