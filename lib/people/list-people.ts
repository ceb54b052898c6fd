import { Op } from "sequelize";
import { gate } from "@/lib/auth/gate";
import { can, type Role } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import { Chapter, Invitation, Membership, User } from "@/models";

export type MemberView = {
  userId: string;
  name: string;
  email: string;
  role: Role;
  chapterIds: string[] | null;
  since: string;
  disabled: boolean;
  isSelf: boolean;
};

export type InvitationRow = {
  id: string;
  email: string;
  role: Role;
  chapterIds: string[] | null;
  sentAt: string;
  expiresAt: string;
  expired: boolean;
};

export type PeopleView = {
  work: { id: string; title: string };
  mayManage: boolean;
  members: MemberView[];
  invitations: InvitationRow[];
  chapters: { id: string; label: string }[];
};

const ORDER: readonly Role[] = ["lead", "author", "referee", "production"];

/**
 * Who belongs to a work. Addresses and invitations are for those who manage people; the others see names and roles.
 * @throws AppError not_found
 */
export async function listPeople(workId: string, user: SessionUser): Promise<PeopleView> {
  const access = await gate(user, "work.read", workId);
  const mayManage = can({ ...access, userId: user.id, isAdmin: user.isAdmin }, "people.manage");
  const [members, invitations, chapters] = await Promise.all([
    Membership.findAll({ where: { workId } }),
    mayManage ? openInvitations(workId) : [],
    mayManage
      ? Chapter.findAll({
          where: { workId },
          attributes: ["id", "number", "title"],
          order: [["number", "ASC"]],
        })
      : [],
  ]);
  const people = new Map(
    (await User.findAll({ where: { id: members.map(({ userId }) => userId) } })).map((row) => [row.id, row]),
  );
  return {
    work: { id: access.work.id, title: access.work.title },
    mayManage,
    members: members
      .map((member) => memberView(member, people.get(member.userId), user.id, mayManage))
      .sort((a, b) => ORDER.indexOf(a.role) - ORDER.indexOf(b.role) || a.name.localeCompare(b.name)),
    invitations: invitations.map(invitationRow),
    chapters: chapters.map(({ id, number, title }) => ({ id, label: `${number} ${title}` })),
  };
}

/** Neither accepted nor withdrawn; an expired one is listed, since it can be sent again. */
const openInvitations = (workId: string) =>
  Invitation.findAll({
    where: { workId, acceptedAt: null, withdrawnAt: null, role: { [Op.in]: [...ORDER] } },
    order: [["createdAt", "DESC"]],
    limit: 500,
  });

function memberView(member: Membership, person: User | undefined, selfId: string, full: boolean): MemberView {
  return {
    userId: member.userId,
    name: person?.name ?? "",
    email: full || member.userId === selfId ? (person?.email ?? "") : "",
    role: member.role,
    chapterIds: full || member.userId === selfId ? member.chapterIds : null,
    since: member.createdAt.toISOString(),
    disabled: full && Boolean(person?.disabledAt),
    isSelf: member.userId === selfId,
  };
}

const invitationRow = ({ id, email, role, chapterIds, createdAt, expiresAt }: Invitation): InvitationRow => ({
  id,
  email,
  role: role as Role,
  chapterIds,
  sentAt: createdAt.toISOString(),
  expiresAt: expiresAt.toISOString(),
  expired: expiresAt <= new Date(),
});
