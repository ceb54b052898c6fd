import { col, fn, type Model, type ModelStatic } from "sequelize";
import type { SessionUser } from "@/lib/auth/user";
import { Claim, Membership, Work } from "@/models";
import { administer } from "./administer";

const PAGE = 50;

export type WorkSize = {
  id: string;
  title: string;
  kind: Work["kind"];
  createdAt: string;
  people: number;
  claims: number;
};

/** Works as names and sizes; nothing in them can be read here. @throws AppError not_found */
export async function listWorkSizes(
  { page = 1 }: { page?: number },
  user: SessionUser,
): Promise<{ rows: WorkSize[]; total: number; page: number; pages: number }> {
  administer(user);
  const { rows, count } = await Work.findAndCountAll({
    attributes: ["id", "title", "kind", "createdAt"],
    order: [
      ["createdAt", "DESC"],
      ["id", "ASC"],
    ],
    limit: PAGE,
    offset: (page - 1) * PAGE,
  });
  const ids = rows.map(({ id }) => id);
  const [people, claims] = await Promise.all([countBy(Membership, ids), countBy(Claim, ids)]);
  return {
    rows: rows.map(({ id, title, kind, createdAt }) => ({
      id,
      title,
      kind,
      createdAt: createdAt.toISOString(),
      people: people.get(id) ?? 0,
      claims: claims.get(id) ?? 0,
    })),
    total: count,
    page,
    pages: Math.max(1, Math.ceil(count / PAGE)),
  };
}

async function countBy(model: ModelStatic<Model>, workIds: string[]): Promise<Map<string, number>> {
  const rows = (await model.findAll({
    attributes: ["workId", [fn("COUNT", col("id")), "count"]],
    where: { workId: workIds },
    group: ["work_id"],
    raw: true,
  })) as unknown as { workId: string; count: number | string }[];
  return new Map(rows.map(({ workId, count }) => [workId, Number(count)]));
}
