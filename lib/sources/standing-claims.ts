import type { Transaction } from "sequelize";
import { keyOf } from "@/lib/claims/text";
import { Claim, Problem } from "@/models";
import type { Standing } from "./plan-rows";

const AT_ONCE = 1_000;

/** The pieces of a list, each of at most `size`. */
export function pieces<T>(list: readonly T[], size: number = AT_ONCE): T[][] {
  return Array.from({ length: Math.ceil(list.length / size) }, (_, i) =>
    list.slice(i * size, (i + 1) * size),
  );
}

/** The claims of the work that have one of these refs, by ref; locked for change inside a transaction. */
export async function standingClaims(
  workId: string,
  refs: readonly string[],
  transaction?: Transaction,
): Promise<Map<string, Standing>> {
  const found: Claim[] = [];
  const wanted = [...new Set(refs.map(keyOf))].filter((ref) => ref !== "" && ref.length <= 60);
  for (const some of pieces(wanted))
    found.push(
      ...(await Claim.findAll({
        attributes: [
          "id",
          "ref",
          "chapterId",
          "problemId",
          "current",
          "quantity",
          "claimed",
          "note",
          "page",
          "withdrawnAt",
        ],
        where: { workId, ref: some },
        order: [["id", "ASC"]],
        transaction: transaction ?? null,
        ...(transaction && { lock: transaction.LOCK.UPDATE }),
      })),
    );
  const problems = await Problem.findAll({
    attributes: ["id", "label"],
    where: { id: [...new Set(found.map(({ problemId }) => problemId))] },
    transaction: transaction ?? null,
  });
  const labels = new Map(problems.map(({ id, label }) => [id, label]));
  return new Map(
    found.map(({ id, ref, chapterId, problemId, current, quantity, claimed, note, page, withdrawnAt }) => [
      keyOf(ref),
      {
        id,
        ref,
        chapterId,
        label: labels.get(problemId) ?? "",
        current,
        quantity,
        claimed,
        note,
        page,
        withdrawn: withdrawnAt !== null,
      },
    ]),
  );
}
