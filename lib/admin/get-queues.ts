import { z } from "zod";

import type { SessionUser } from "@/lib/auth/user";
import { health, type Health } from "@/lib/health";
import { listTroubled, outboxDepth, type OutboxView } from "@/lib/jobs/dead-letters";
import { Outbox } from "@/models";
import type { OutboxState } from "@/models/outbox";
import { administer } from "./administer";

export type OutgoingMail = { id: string; to: string; template: string; state: OutboxState; at: string };

export type Queues = {
  depth: { pending: number; dead: number; oldestDueSeconds: number };
  health: Health;
  troubled: OutboxView[];
  mail: OutgoingMail[];
};

/** What waits, what failed, and the latest mails: to whom and which kind, never what they say. @throws AppError not_found */
export async function getQueues(user: SessionUser): Promise<Queues> {
  administer(user);
  const [depth, state, troubled, rows] = await Promise.all([
    outboxDepth(),
    health(),
    listTroubled(),
    Outbox.findAll({ where: { kind: "mail" }, order: [["createdAt", "DESC"]], limit: 50 }),
  ]);
  return { depth, health: state, troubled, mail: rows.flatMap(outgoing) };
}

/** What is left of a mail once it was sent, and part of it before. */
const Envelope = z.object({ to: z.string(), template: z.string() });

function outgoing(row: Outbox): OutgoingMail[] {
  const payload = Envelope.safeParse(row.payload);
  if (!payload.success) return [];
  const { to, template } = payload.data;
  return [{ id: row.id, to, template, state: row.state, at: row.createdAt.toISOString() }];
}
