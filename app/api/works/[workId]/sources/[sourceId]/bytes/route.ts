import { getUser } from "@/lib/auth/session";
import { notFound } from "@/lib/errors";
import { route } from "@/lib/http";
import { attachment } from "@/lib/sources/file-name";
import { getSourceBytes } from "@/lib/sources/get-source-bytes";

/** A source as it came. Always saved, never shown: whatever is in it, no browser may take it for a page. */
export const GET = route(
  async (_request, { params }: RouteContext<"/api/works/[workId]/sources/[sourceId]/bytes">) => {
    const user = await getUser();
    if (!user) throw notFound();
    const { workId, sourceId } = await params;
    const { name, sha256, bytes } = await getSourceBytes(workId, sourceId, user);
    return new Response(new Uint8Array(bytes), {
      headers: {
        "content-type": "application/octet-stream",
        "content-length": String(bytes.byteLength),
        "content-disposition": attachment(name),
        "content-digest": `sha-256=:${Buffer.from(sha256, "hex").toString("base64")}:`,
        "content-security-policy": "sandbox; default-src 'none'",
        "x-content-type-options": "nosniff",
        "cache-control": "private, no-store",
      },
    });
  },
);
