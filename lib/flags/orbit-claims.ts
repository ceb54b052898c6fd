import { Op } from "sequelize";

import { visibleChapters, type Access } from "@/lib/auth/gate";
import { readClaim } from "@/lib/claims/reading";
import { readDetails } from "@/lib/flags/finding-details";
import type { Conventions } from "@/lib/verify/conventions";
import { Claim, Finding } from "@/models";

const SHOWN = 12;

/** Other claims of the work that a symmetry joins to this one, in the chapters this person may see. */
export async function orbitClaims(claim: Claim, access: Access, conventions: Conventions) {
  if (claim.orbitKey === null) return { total: 0, claims: [] };
  const { rows, count } = await Claim.findAndCountAll({
    attributes: ["id", "ref", "quantity", "claimed", "verdict"],
    where: {
      workId: claim.workId,
      orbitKey: claim.orbitKey,
      id: { [Op.ne]: claim.id },
      withdrawnAt: null,
      ...visibleChapters(access),
    },
    include: [{ model: Finding, as: "finding", attributes: ["details"], required: false }],
    order: [["ref", "ASC"]],
    limit: SHOWN,
  });
  return {
    total: count,
    claims: rows.map((row) => {
      const kept = readDetails((row as Claim & { finding: Finding | null }).finding?.details).reading;
      const reading = kept ?? readClaim(row.quantity, row.claimed, conventions);
      return {
        id: row.id,
        ref: row.ref,
        verdict: row.verdict,
        quantity: { text: row.quantity, latex: reading.quantityLatex },
        claimed: { text: row.claimed, latex: reading.claimedLatex },
      };
    }),
  };
}
