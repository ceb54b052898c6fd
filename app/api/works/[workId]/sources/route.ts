import { z } from "zod";

import { getUser } from "@/lib/auth/session";
import { AppError } from "@/lib/errors";
import { route } from "@/lib/http";
import { readUpload } from "@/lib/sources/read-upload";
import { mayReceive, receiveSource } from "@/lib/sources/receive-source";

const Query = z.object({ chapter: z.uuid(), name: z.string().min(1).max(1_000) });

/**
 * Takes in one key file: POST ?chapter=…&name=… with the file itself as the body, its Content-Length and, where the
 * browser can compute it, its Content-Digest. Not matched by proxy.ts, which would cut long bodies without a word.
 */
export const POST = route(async (request, { params }: RouteContext<"/api/works/[workId]/sources">) => {
  const user = await getUser();
  if (!user)
    throw new AppError(
      "forbidden",
      "Your session has ended. Sign in again in another tab, then upload this once more.",
    );
  const { workId } = await params;
  const query = Query.safeParse(Object.fromEntries(new URL(request.url).searchParams));
  if (!query.success)
    throw new AppError("invalid", "The address of an upload names its chapter and the file.");
  const { chapter: chapterId, name } = query.data;
  await mayReceive(workId, chapterId, user);
  const upload = await readUpload(request);
  const received = await receiveSource({ workId, chapterId, name, ...upload }, user);
  return Response.json(received, {
    status: received.same ? 200 : 201,
    headers: { "cache-control": "no-store", location: `/works/${workId}/sources/${received.id}` },
  });
});
