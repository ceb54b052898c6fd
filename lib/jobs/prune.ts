import { Op } from "sequelize";
import { Outbox } from "@/models";

const KEEP_DAYS = 30;

/** Forgets what was done a month ago, a thousand rows at a time, so that the outbox stays small. */
export async function pruneOutbox(): Promise<void> {
  const before = new Date(Date.now() - KEEP_DAYS * 86_400_000);
  await Outbox.destroy({ where: { state: "done", doneAt: { [Op.lt]: before } }, limit: 1_000 });
}
