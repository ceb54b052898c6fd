import { Op } from "sequelize";

import { gate, visibleChapters } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { conventionsAt } from "@/lib/works/conventions-at";
import { flagIncludes, flagOrder, flagWhere } from "@/lib/flags/flag-list-query";
import { FLAGS_PER_PAGE, LAST_PAGE, type FlagQuery } from "@/lib/flags/flag-query";
import { toFlagRow, type FlagRow } from "@/lib/flags/flag-row";
import { Chapter, Flag, Membership, Settlement, User } from "@/models";

export type FlagList = {
  rows: FlagRow[];
  total: number;
  page: number;
  pages: number;
  /** how many are open in all, whatever the filters say */
  open: number;
  /** how many of the open ones wait for this person */
  mine: number;
  /** when it was read; of two answers the later one holds */
  readAt: string;
};

/**
 * A page of the review queue: only the chapters that this person may see.
 * @throws AppError not_found outside the work
 */
export async function listFlags(workId: string, query: FlagQuery, user: SessionUser): Promise<FlagList> {
  const access = await gate(user, "flag.read", workId);
  const seen = { workId, ...visibleChapters(access) };
  const readAt = new Date().toISOString();
  const [conventions, found, open, mine] = await Promise.all([
    conventionsAt(workId, access.work.conventionsVersion),
    Flag.findAndCountAll({
      where: { [Op.and]: [seen, flagWhere(query, user.id)] },
      include: flagIncludes(query),
      order: flagOrder(query),
      limit: FLAGS_PER_PAGE,
      offset: (query.page - 1) * FLAGS_PER_PAGE,
      subQuery: false,
    }),
    Flag.count({ where: { ...seen, state: "open" } }),
    Flag.count({ where: { ...seen, state: "open", assigneeId: user.id } }),
  ]);
  const active = await activeSettlements(found.rows.map(({ id }) => id));
  return {
    rows: found.rows.map((flag) => toFlagRow(flag, active.get(flag.id), user.id, conventions)),
    total: found.count,
    page: query.page,
    pages: Math.min(LAST_PAGE, Math.max(1, Math.ceil(found.count / FLAGS_PER_PAGE))),
    open,
    mine,
    readAt,
  };
}

async function activeSettlements(flagIds: string[]): Promise<Map<string, Settlement>> {
  if (flagIds.length === 0) return new Map();
  const settlements = await Settlement.findAll({ where: { activeFlagId: flagIds } });
  return new Map(settlements.map((settlement) => [settlement.flagId, settlement]));
}

export type FlagFilters = {
  work: { id: string; title: string };
  chapters: { id: string; number: number; title: string }[];
  people: { id: string; name: string }[];
};

/** What the filters of the queue offer: the chapters this person may see and the people who settle. */
export async function listFlagFilters(workId: string, user: SessionUser): Promise<FlagFilters> {
  const access = await gate(user, "flag.read", workId);
  const { chapterIds } = access;
  const [chapters, members] = await Promise.all([
    Chapter.findAll({
      attributes: ["id", "number", "title"],
      where: { workId, ...(chapterIds === null ? {} : { id: chapterIds }) },
      order: [["number", "ASC"]],
    }),
    Membership.findAll({
      attributes: ["userId"],
      where: { workId, role: ["lead", "author", "referee"] },
      include: [{ model: User, as: "user", attributes: ["id", "name"], required: true }],
      order: [["user", "name", "ASC"]],
    }),
  ]);
  return {
    work: { id: access.work.id, title: access.work.title },
    chapters: chapters.map(({ id, number, title }) => ({ id, number, title })),
    people: members.map((member) => {
      const { id, name } = (member as Membership & { user: User }).user;
      return { id, name };
    }),
  };
}
