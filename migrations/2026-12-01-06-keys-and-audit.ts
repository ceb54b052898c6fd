import { HASH, ID, TABLE } from "./shared/columns";
import { dropTables, statements, type Migration } from "./shared/statements";

const refuse = (table: string, verb: "UPDATE" | "DELETE", says: string) =>
  `CREATE TRIGGER ${table}_no_${verb.toLowerCase()} BEFORE ${verb} ON ${table} FOR EACH ROW
    SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = '${says}'`;

/** What is written once and for ever: frozen keys and the record of who did what. */
export const up = ({ context }: Migration) =>
  statements(context, [
    `CREATE TABLE frozen_keys (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NOT NULL,
      number INT NOT NULL,
      canonical_json LONGTEXT CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
      sha256 ${HASH} NOT NULL,
      claims INT NOT NULL,
      frozen_by_id ${ID} NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY frozen_keys_number (work_id, number),
      CONSTRAINT frozen_keys_work_fk FOREIGN KEY (work_id) REFERENCES works (id),
      CONSTRAINT frozen_keys_freezer_fk FOREIGN KEY (frozen_by_id) REFERENCES users (id),
      CONSTRAINT frozen_keys_hash_true CHECK (UNHEX(sha256) = UNHEX(SHA2(canonical_json, 256))),
      CONSTRAINT frozen_keys_counted CHECK (number >= 1 AND claims >= 0)
    ) ${TABLE}`,
    refuse("frozen_keys", "UPDATE", "A frozen key is never changed."),
    refuse("frozen_keys", "DELETE", "A frozen key is never deleted."),
    `CREATE TABLE audit_events (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      work_id ${ID} NULL,
      actor_id ${ID} NULL,
      action VARCHAR(60) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      subject_type VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      subject_id VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      \`before\` LONGTEXT NULL,
      \`after\` LONGTEXT NULL,
      created_at DATETIME(3) NOT NULL,
      KEY audit_events_work (work_id, id),
      KEY audit_events_subject (subject_type, subject_id, id),
      KEY audit_events_actor (actor_id, id)
    ) ${TABLE}`,
    refuse("audit_events", "UPDATE", "What happened is never rewritten."),
    refuse("audit_events", "DELETE", "What happened is never deleted."),
  ]);

export const down = async ({ context }: Migration) => {
  await statements(
    context,
    ["audit_events", "frozen_keys"].flatMap((table) => [
      `DROP TRIGGER IF EXISTS ${table}_no_update`,
      `DROP TRIGGER IF EXISTS ${table}_no_delete`,
    ]),
  );
  await dropTables(context, ["audit_events", "frozen_keys"]);
};
