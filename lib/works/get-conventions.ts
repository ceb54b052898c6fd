import { gate } from "@/lib/auth/gate";
import { can } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import type { Conventions } from "@/lib/verify/conventions";
import { Claim, ConventionsSheet, User } from "@/models";
import { readConventions } from "./schema";

export type ConventionsView = {
  work: { id: string; title: string };
  version: number;
  conventions: Conventions;
  mayEdit: boolean;
  /** claims that have a verdict now, which a change would make due for a new run */
  judged: number;
  history: { version: number; by: string; at: string; conventions: Conventions }[];
};

/** The sheet in force and those before it. @throws AppError not_found, also for production */
export async function getConventions(workId: string, user: SessionUser): Promise<ConventionsView> {
  const access = await gate(user, "chapter.read", workId);
  const [sheets, unjudged, all] = await Promise.all([
    ConventionsSheet.findAll({ where: { workId }, order: [["version", "DESC"]], limit: 100 }),
    Claim.count({ where: { workId, verdict: null } }),
    Claim.count({ where: { workId } }),
  ]);
  const names = new Map(
    (
      await User.findAll({
        where: { id: sheets.map((sheet) => sheet.createdById) },
        attributes: ["id", "name"],
      })
    ).map(({ id, name }) => [id, name]),
  );
  const version = access.work.conventionsVersion;
  const current = sheets.find((sheet) => sheet.version === version);
  return {
    work: { id: access.work.id, title: access.work.title },
    version,
    conventions: readConventions(current?.choices),
    mayEdit: can({ ...access, isAdmin: user.isAdmin }, "conventions.edit"),
    judged: all - unjudged,
    history: sheets.map((sheet) => ({
      version: sheet.version,
      by: names.get(sheet.createdById) ?? "",
      at: sheet.createdAt.toISOString(),
      conventions: readConventions(sheet.choices),
    })),
  };
}
