import { createHash } from "node:crypto";
import { AppError } from "@/lib/errors";
import { SOURCE_LIMITS, sizeInWords } from "./limits";

export type Upload = { bytes: Buffer; sha256: string };

type Body = { headers: Headers; body: ReadableStream<Uint8Array> | null };

const tooLarge = () =>
  new AppError(
    "too_large",
    `A key file may have at most ${sizeInWords(SOURCE_LIMITS.bytes)}. Divide it by problems and upload the parts.`,
  );

/**
 * Takes in a body piece by piece, up to the limit and no further, and compares what arrived with what was announced:
 * Content-Length, and Content-Digest (RFC 9530, sha-256) where the browser could compute it. Nothing that is shorter,
 * longer or other than announced is ever taken for the file.
 * @throws AppError too_large; invalid when length or digest differ, none was given, or it took too long
 */
export async function readUpload(
  { headers, body }: Body,
  milliseconds: number = SOURCE_LIMITS.milliseconds,
): Promise<Upload> {
  const announced = announcedLength(headers.get("content-length"));
  const digest = announcedDigest(headers.get("content-digest"));
  if (announced !== null && announced > SOURCE_LIMITS.bytes) throw tooLarge();
  if (announced === null && digest === null)
    throw new AppError(
      "invalid",
      "The request says neither how long the file is nor what its digest is, so a cut-off file could not be told from a whole one.",
    );
  const pieces: Uint8Array[] = [];
  const hash = createHash("sha256");
  let size = 0;
  await eachPiece(body, milliseconds, (piece) => {
    size += piece.byteLength;
    if (size > SOURCE_LIMITS.bytes) throw tooLarge();
    hash.update(piece);
    pieces.push(piece);
  });
  const sha256 = hash.digest("hex");
  if (announced !== null && announced !== size)
    throw new AppError(
      "invalid",
      `The file was announced with ${announced} bytes, but ${size} arrived. Nothing was kept; upload it again.`,
    );
  if (digest !== null && digest !== sha256)
    throw new AppError(
      "invalid",
      "The file changed on its way: its SHA-256 is not the one that your browser computed. Nothing was kept; upload it again.",
    );
  return { bytes: Buffer.concat(pieces), sha256 };
}

async function eachPiece(
  body: ReadableStream<Uint8Array> | null,
  milliseconds: number,
  take: (piece: Uint8Array) => void,
): Promise<void> {
  const reader = body?.getReader();
  if (!reader) return;
  let slow: NodeJS.Timeout | undefined;
  const deadline = new Promise<never>((_, reject) => {
    slow = setTimeout(
      () =>
        reject(
          new AppError(
            "invalid",
            "The upload took too long and was given up. Nothing was kept; try again on a better line.",
          ),
        ),
      milliseconds,
    );
  });
  try {
    for (;;) {
      const piece = await Promise.race([reader.read(), deadline]).catch((error: unknown) => {
        throw error instanceof AppError
          ? error
          : new AppError(
              "invalid",
              "The upload broke off before the end. Nothing was kept; upload it again.",
            );
      });
      if (piece.done) return;
      take(piece.value);
    }
  } catch (error) {
    reader.cancel().catch(() => undefined);
    throw error;
  } finally {
    clearTimeout(slow);
  }
}

function announcedLength(text: string | null): number | null {
  if (text === null) return null;
  if (!/^\d{1,15}$/.test(text))
    throw new AppError("invalid", "The Content-Length of the request is not a number.");
  return Number(text);
}

/** The sha-256 of a Content-Digest header as hex; other algorithms in it are passed over. */
function announcedDigest(text: string | null): string | null {
  if (text === null) return null;
  const found = /(?:^|,)\s*sha-256=:([A-Za-z0-9+/]{43}=):/.exec(text);
  if (!found) throw new AppError("invalid", "The Content-Digest of the request has no readable sha-256.");
  return Buffer.from(found[1] ?? "", "base64").toString("hex");
}
