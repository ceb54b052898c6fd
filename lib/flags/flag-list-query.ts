import { Op, type Order, type WhereOptions } from "sequelize";

import type { FlagQuery } from "@/lib/flags/flag-query";
import { Chapter, Claim, Finding, Problem, User } from "@/models";

/** The `include` of every list of flags: plain columns only, so that paging stays in the database. */
export function flagIncludes(query: FlagQuery) {
  const finding: WhereOptions = {
    ...(query.verdict ? { verdict: query.verdict } : {}),
    // The column is JSON text; a slip's id stands in it between quotation marks and nowhere else.
    ...(query.slip ? { slips: { [Op.like]: `%"${query.slip}"%` } } : {}),
  };
  return [
    { model: Chapter, as: "chapter", attributes: ["id", "number", "title"], required: true },
    {
      model: Claim,
      as: "claim",
      attributes: ["id", "ref", "quantity", "claimed", "position", "current"],
      required: true,
      include: [{ model: Problem, as: "problem", attributes: ["id", "position"], required: true }],
    },
    {
      model: Finding,
      as: "finding",
      attributes: ["verdict", "exactLatex", "exactText", "slips", "reason", "details"],
      where: finding,
      required: true,
    },
    { model: User, as: "claimant", attributes: ["id", "name"], required: true },
    { model: User, as: "assignee", attributes: ["id", "name"], required: false },
  ];
}

/** What narrows a list of flags, beside the work and the chapters that the person may see. */
export function flagWhere(query: FlagQuery, userId: string): WhereOptions {
  return {
    ...(query.state === "all" ? {} : { state: query.state }),
    ...(query.chapter ? { chapterId: query.chapter } : {}),
    ...(query.assignee === undefined
      ? {}
      : query.assignee === "nobody"
        ? { assigneeId: null }
        : { assigneeId: query.assignee === "me" ? userId : query.assignee }),
  };
}

/** Sorting by a column that is not unique ends with the place in the work, then the id, so that paging is stable. */
export function flagOrder({ sort, order }: FlagQuery): Order {
  const way = order === "ascending" ? "ASC" : "DESC";
  const place: string[][] = [
    ["chapter", "number", way],
    ["claim", "problem", "position", way],
    ["claim", "position", way],
    ["claim", "ref", way],
  ];
  const first: Record<FlagQuery["sort"], string[][]> = {
    place: [],
    // The oldest flag has the greatest age.
    age: [["createdAt", order === "ascending" ? "DESC" : "ASC"]],
    verdict: [["finding", "verdict", way]],
    claimant: [["claimant", "name", way]],
    assignee: [["assignee", "name", way]],
  };
  return [...first[sort], ...place, ["id", way]] as Order;
}
