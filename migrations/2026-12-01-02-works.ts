import { HASH, ID, TABLE, WORD } from "./shared/columns";
import { dropTables, statements, type Migration } from "./shared/statements";

/** Works, who belongs to them, and the links by which people join. */
export const up = ({ context }: Migration) =>
  statements(context, [
    `CREATE TABLE works (
      id ${ID} NOT NULL PRIMARY KEY,
      title VARCHAR(200) NOT NULL,
      kind ${WORD} NOT NULL,
      confidential TINYINT(1) NOT NULL DEFAULT 0,
      conventions_version INT NOT NULL DEFAULT 1,
      created_by_id ${ID} NOT NULL,
      archived_at DATETIME(3) NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      KEY works_created (created_at, id),
      CONSTRAINT works_creator_fk FOREIGN KEY (created_by_id) REFERENCES users (id),
      CONSTRAINT works_title_given CHECK (title <> ''),
      CONSTRAINT works_kind_known CHECK (kind IN ('book', 'exam', 'course-pack')),
      CONSTRAINT works_conventions_counted CHECK (conventions_version >= 1)
    ) ${TABLE}`,
    `CREATE TABLE conventions_sheets (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NOT NULL,
      version INT NOT NULL,
      choices LONGTEXT NOT NULL,
      created_by_id ${ID} NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY conventions_sheets_version (work_id, version),
      CONSTRAINT conventions_sheets_work_fk FOREIGN KEY (work_id) REFERENCES works (id),
      CONSTRAINT conventions_sheets_creator_fk FOREIGN KEY (created_by_id) REFERENCES users (id),
      CONSTRAINT conventions_sheets_choices_read CHECK (JSON_VALID(choices))
    ) ${TABLE}`,
    `CREATE TABLE memberships (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NOT NULL,
      user_id ${ID} NOT NULL,
      role ${WORD} NOT NULL,
      chapter_ids LONGTEXT NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY memberships_person (work_id, user_id),
      KEY memberships_user (user_id, work_id),
      CONSTRAINT memberships_work_fk FOREIGN KEY (work_id) REFERENCES works (id),
      CONSTRAINT memberships_user_fk FOREIGN KEY (user_id) REFERENCES users (id),
      CONSTRAINT memberships_role_known CHECK (role IN ('lead', 'author', 'referee', 'production')),
      CONSTRAINT memberships_chapters_of_referee CHECK (chapter_ids IS NULL OR (role = 'referee' AND JSON_VALID(chapter_ids)))
    ) ${TABLE}`,
    `CREATE TABLE invitations (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NULL,
      email VARCHAR(254) NOT NULL,
      role ${WORD} NOT NULL,
      chapter_ids LONGTEXT NULL,
      token_hash ${HASH} NOT NULL,
      invited_by_id ${ID} NULL,
      expires_at DATETIME(3) NOT NULL,
      accepted_at DATETIME(3) NULL,
      accepted_by_id ${ID} NULL,
      withdrawn_at DATETIME(3) NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY invitations_token (token_hash),
      KEY invitations_work (work_id, created_at),
      CONSTRAINT invitations_work_fk FOREIGN KEY (work_id) REFERENCES works (id),
      CONSTRAINT invitations_inviter_fk FOREIGN KEY (invited_by_id) REFERENCES users (id),
      CONSTRAINT invitations_accepter_fk FOREIGN KEY (accepted_by_id) REFERENCES users (id),
      CONSTRAINT invitations_role_known CHECK (
        (work_id IS NOT NULL AND role IN ('lead', 'author', 'referee', 'production'))
        OR (work_id IS NULL AND role IN ('person', 'administrator'))),
      CONSTRAINT invitations_ended_once CHECK (accepted_at IS NULL OR withdrawn_at IS NULL),
      CONSTRAINT invitations_accepted_by_somebody CHECK ((accepted_at IS NULL) = (accepted_by_id IS NULL))
    ) ${TABLE}`,
  ]);

export const down = ({ context }: Migration) =>
  dropTables(context, ["invitations", "memberships", "conventions_sheets", "works"]);
