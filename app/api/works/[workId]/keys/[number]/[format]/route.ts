import { z } from "zod";

import { getUser } from "@/lib/auth/session";
import { notFound } from "@/lib/errors";
import { route } from "@/lib/http";
import { exportKey } from "@/lib/keys/export-key";
import { KeyFormat, KeyNumber } from "@/lib/keys/schema";

type Context = { params: Promise<{ workId: string; number: string; format: string }> };

const Address = z.object({ workId: z.uuid(), number: KeyNumber, format: KeyFormat });

/** A frozen key as a file to keep. Never shown as a page. */
export const GET = route(async (_request: Request, { params }: Context) => {
  const user = await getUser();
  const address = Address.safeParse(await params);
  if (!user || !address.success) throw notFound();
  const { workId, number, format } = address.data;
  const { body, contentType, fileName } = await exportKey(workId, number, format, user);
  return new Response(body, {
    headers: {
      "content-type": contentType,
      "content-disposition": `attachment; filename="${fileName}"`,
      "content-security-policy": "sandbox; default-src 'none'",
      "x-content-type-options": "nosniff",
      "cache-control": "private, no-store",
    },
  });
});
