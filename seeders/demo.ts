import { audit } from "@/lib/audit";
import { transact } from "@/lib/transact";
import { AuditEvent, Work } from "@/models";

import { makePeople } from "./demo-people";
import { tellStory } from "./demo-story";
import { DEMO_TITLE } from "./demo-text";

const MADE = "demo.made";

/**
 * Makes the demo work once. Called again it only gives the demo people new passwords and writes the file anew; a work that
 * was left half made is put away and begun from the start.
 * @returns whether a work was made
 */
export async function seedDemo(file: string): Promise<boolean> {
  const cast = await makePeople(file);
  if (await AuditEvent.findOne({ attributes: ["id"], where: { action: MADE } })) return false;
  await Work.update(
    { title: `${DEMO_TITLE} (unfinished)`, archivedAt: new Date() },
    { where: { title: DEMO_TITLE, createdById: cast.lead.id } },
  );
  const { workId } = await tellStory(cast);
  await transact((transaction) =>
    audit(transaction, { workId, action: MADE, subjectType: "work", subjectId: workId }),
  );
  return true;
}
