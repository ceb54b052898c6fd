import { QueryTypes } from "sequelize";
import { afterAll, beforeAll, expect, it } from "vitest";
import { buildClaim, buildFlag, buildProblem, buildWork } from "../../factories";
import { sequelize } from "@/models";

let ids: { work: string; chapter: string; user: string; run: string; claim: string };

beforeAll(async () => {
  const work = await buildWork();
  const problem = await buildProblem({ workId: work.id });
  const claim = await buildClaim({ problemId: problem.id });
  const flag = await buildFlag({ claimId: claim.id });
  ids = {
    work: work.id,
    chapter: problem.chapterId,
    user: work.createdById,
    run: flag.runId,
    claim: claim.id,
  };
});
afterAll(() => sequelize.close());

/** The lists of the product, as the database gets them, and the key that must be able to serve each. */
const LISTS: [string, string, string][] = [
  [
    "claims of a chapter in order",
    "SELECT id FROM claims WHERE chapter_id = :chapter ORDER BY position LIMIT 100",
    "claims_position",
  ],
  ["claims of an orbit", "SELECT id FROM claims WHERE work_id = :work AND orbit_key = 'x'", "claims_orbit"],
  [
    "claims by verdict",
    "SELECT COUNT(*) FROM claims WHERE work_id = :work AND verdict = 'discrepant'",
    "claims_verdict",
  ],
  ["a claim by its ref", "SELECT id FROM claims WHERE work_id = :work AND ref = 'x'", "claims_ref"],
  [
    "somebody's claims that came back",
    "SELECT id FROM claims WHERE claimant_id = :user AND verdict IN ('discrepant')",
    "claims_claimant",
  ],
  [
    "the review queue",
    "SELECT id FROM flags WHERE work_id = :work AND state = 'open' ORDER BY created_at LIMIT 25",
    "flags_queue",
  ],
  [
    "flags of somebody",
    "SELECT id FROM flags WHERE assignee_id = :user AND state = 'open' ORDER BY created_at LIMIT 12",
    "flags_assignee",
  ],
  [
    "findings of a batch",
    "SELECT id FROM findings WHERE run_id = :run AND batch = 0 AND verdict IS NULL",
    "findings_batch",
  ],
  [
    "findings of a claim",
    "SELECT id FROM findings WHERE claim_id = :claim ORDER BY created_at",
    "findings_claim",
  ],
  [
    "what is due",
    "SELECT id FROM outbox WHERE state = 'pending' AND due_at <= NOW(3) ORDER BY due_at LIMIT 50",
    "outbox_due",
  ],
  [
    "the record of a work",
    "SELECT id FROM audit_events WHERE work_id = :work ORDER BY id DESC LIMIT 50",
    "audit_events_work",
  ],
  [
    "a session by its secret",
    "SELECT id FROM sessions WHERE token_hash = 'x' AND revoked_at IS NULL",
    "sessions_token",
  ],
  ["an invitation by its secret", "SELECT id FROM invitations WHERE token_hash = 'x'", "invitations_token"],
  ["works of somebody", "SELECT work_id FROM memberships WHERE user_id = :user", "memberships_user"],
  [
    "runs of a chapter",
    "SELECT id FROM runs WHERE chapter_id = :chapter ORDER BY created_at DESC LIMIT 1",
    "runs_chapter",
  ],
];

it.each(LISTS)("%s: served by a key", async (_name, statement, key) => {
  const plan = await sequelize.query<{ possible_keys: string | null; Extra: string | null }>(
    `EXPLAIN ${statement}`,
    { type: QueryTypes.SELECT, replacements: ids },
  );
  // With a handful of rows the optimiser may scan all the same; what matters is that the key can serve the list. A
  // unique key that finds nothing is looked up while the plan is made, and the plan then says so instead.
  const keys = plan.flatMap((row) => (row.possible_keys ?? "").split(","));
  const looked = plan.some((row) => /const tables/.test(row.Extra ?? ""));
  expect([...keys, ...(looked ? [key] : [])]).toContain(key);
});
