import { hashToken, isToken } from "@/lib/auth/tokens";
import { Invitation, User, Work } from "@/models";
import { isPending, unusableLink } from "./invitations";

export type InvitationView = {
  /** null for the first administrator, who gives their own */
  email: string | null;
  /** whether this address has an account, which then has to sign in */
  hasAccount: boolean;
  workTitle: string | null;
  role: Invitation["role"];
  invitedBy: string | null;
  expiresAt: string;
};

/**
 * What a link is for. Looking changes nothing, so a program that opens links in mails does no harm.
 * @throws AppError invalid, with one sentence for whatever is wrong
 */
export async function lookAtInvitation(token: string): Promise<InvitationView> {
  if (!isToken(token)) throw unusableLink();
  const invitation = await Invitation.findOne({ where: { tokenHash: hashToken(token) } });
  if (!invitation || !isPending(invitation)) throw unusableLink();
  const [work, inviter, account] = await Promise.all([
    invitation.workId ? Work.findByPk(invitation.workId, { attributes: ["title"] }) : null,
    invitation.invitedById ? User.findByPk(invitation.invitedById, { attributes: ["name"] }) : null,
    User.findOne({ where: { email: invitation.email }, attributes: ["id"] }),
  ]);
  return {
    email: invitation.email === "" ? null : invitation.email,
    hasAccount: account !== null,
    workTitle: work?.title ?? null,
    role: invitation.role,
    invitedBy: inviter?.name ?? null,
    expiresAt: invitation.expiresAt.toISOString(),
  };
}
