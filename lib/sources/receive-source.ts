import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, notFound } from "@/lib/errors";
import { takePoint } from "@/lib/limits";
import { transact } from "@/lib/transact";
import { Chapter, Source } from "@/models";
import type { SourceState } from "@/models/source";
import { cleanFileName } from "./file-name";
import { SOURCE_LIMITS } from "./limits";
import type { Upload } from "./read-upload";
import { notAKey } from "./recognise";

export type Received = {
  id: string;
  name: string;
  state: SourceState;
  /** These very bytes were uploaded to this chapter before: that source is offered, nothing is stored twice. */
  same: boolean;
};

/** Whether this person may upload here at all; asked before a byte is taken in. */
export async function mayReceive(workId: string, chapterId: string, user: SessionUser): Promise<void> {
  await gate(user, "source.upload", workId, { chapterId });
  if (!(await Chapter.findOne({ attributes: ["id"], where: { id: chapterId, workId } }))) throw notFound();
  await takePoint({ name: "upload", points: SOURCE_LIMITS.uploadsPerHour, seconds: 3_600 }, user.id);
}

/**
 * Keeps an uploaded key file byte for byte, whether or not it can be read later.
 * @throws AppError not_found; forbidden; invalid when it cannot be a key file at all
 */
export async function receiveSource(
  input: { workId: string; chapterId: string; name: string } & Upload,
  user: SessionUser,
): Promise<Received> {
  const { workId, chapterId, bytes, sha256 } = input;
  await gate(user, "source.upload", workId, { chapterId });
  const name = cleanFileName(input.name);
  const other = notAKey(bytes);
  if (other) throw new AppError("invalid", `${other} A key is a CSV or JSON file in UTF-8.`);
  return transact(async (transaction) => {
    // The lock on the chapter makes the same file sent twice at once one source.
    const chapter = await Chapter.findOne({
      where: { id: chapterId, workId },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (!chapter) throw notFound();
    await gate(user, "source.upload", workId, { chapterId }, transaction);
    const known = await Source.findOne({
      attributes: ["id", "name", "state"],
      where: { chapterId, sha256 },
      order: [["createdAt", "DESC"]],
      lock: transaction.LOCK.SHARE,
      transaction,
    });
    if (known) return { id: known.id, name: known.name, state: known.state, same: true };
    const source = await Source.create(
      {
        workId,
        chapterId,
        name,
        format: name.toLowerCase().endsWith(".json") ? "json" : "csv",
        bytes,
        size: bytes.byteLength,
        sha256,
        uploadedById: user.id,
      },
      { transaction },
    );
    await audit(transaction, {
      workId,
      actorId: user.id,
      action: "source.receive",
      subjectType: "source",
      subjectId: source.id,
      after: { name, size: bytes.byteLength, sha256 },
    });
    return { id: source.id, name, state: source.state, same: false };
  });
}
