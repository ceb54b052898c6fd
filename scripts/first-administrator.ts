import { randomUUID } from "node:crypto";
import { hashToken, newToken } from "@/lib/auth/tokens";
import { env } from "@/lib/env";
import { expiryFrom } from "@/lib/people/invitations";
import { Invitation, User, sequelize } from "@/models";

/**
 * While nobody has an account, prints a link by which the first administrator makes theirs. It works once, for a
 * week; each start makes a new one and the one before stops working.
 */
async function firstAdministrator(): Promise<string | null> {
  if ((await User.count()) > 0) return null;
  const token = newToken();
  await sequelize.transaction(async (transaction) => {
    await Invitation.update(
      { withdrawnAt: new Date() },
      {
        where: { invitedById: null, role: "administrator", acceptedAt: null, withdrawnAt: null },
        transaction,
      },
    );
    await Invitation.create(
      {
        id: randomUUID(),
        // Whoever opens the link gives their own address.
        email: "",
        role: "administrator",
        tokenHash: hashToken(token),
        expiresAt: expiryFrom(new Date()),
      },
      { transaction },
    );
  });
  return `${env.APP_URL}/join#${token}`;
}

firstAdministrator()
  .then((link) => {
    if (link)
      console.log(
        `\n  Nobody has an account yet. The first administrator opens, within a week:\n    ${link}\n`,
      );
  })
  .catch((error: unknown) => {
    console.error(error instanceof Error ? error.message : error);
    process.exitCode = 1;
  })
  .finally(() => sequelize.close());
