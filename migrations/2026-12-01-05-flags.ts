import { ID, TABLE, WORD } from "./shared/columns";
import { dropTables, statements, type Migration } from "./shared/statements";

/** Flags, how they were settled, what was said about them, and the waivers. */
export const up = ({ context }: Migration) =>
  statements(context, [
    `CREATE TABLE flags (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NOT NULL,
      chapter_id ${ID} NOT NULL,
      claim_id ${ID} NOT NULL,
      claim_version INT NOT NULL,
      finding_id ${ID} NOT NULL,
      run_id ${ID} NOT NULL,
      claimant_id ${ID} NOT NULL,
      state ${WORD} NOT NULL DEFAULT 'open',
      open_claim_id ${ID} NULL,
      assignee_id ${ID} NULL,
      told_at DATETIME(3) NULL,
      version INT NOT NULL DEFAULT 0,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY flags_one_open (open_claim_id),
      UNIQUE KEY flags_of_claimant (id, claimant_id),
      UNIQUE KEY flags_of_work (id, work_id),
      KEY flags_queue (work_id, state, created_at),
      KEY flags_chapter (chapter_id, state, created_at),
      KEY flags_assignee (assignee_id, state, created_at),
      KEY flags_claim (claim_id, created_at),
      KEY flags_claimant (claimant_id, state),
      CONSTRAINT flags_claim_fk FOREIGN KEY (claim_id, work_id) REFERENCES claims (id, work_id),
      CONSTRAINT flags_chapter_fk FOREIGN KEY (chapter_id, work_id) REFERENCES chapters (id, work_id),
      CONSTRAINT flags_version_fk FOREIGN KEY (claim_id, claim_version) REFERENCES claim_versions (claim_id, number),
      CONSTRAINT flags_finding_fk FOREIGN KEY (finding_id, claim_id) REFERENCES findings (id, claim_id),
      CONSTRAINT flags_run_fk FOREIGN KEY (run_id, work_id) REFERENCES runs (id, work_id),
      CONSTRAINT flags_claimant_fk FOREIGN KEY (claimant_id) REFERENCES users (id),
      CONSTRAINT flags_assignee_fk FOREIGN KEY (assignee_id) REFERENCES users (id),
      CONSTRAINT flags_state_known CHECK (state IN ('open', 'settled', 'superseded')),
      CONSTRAINT flags_open_marked CHECK (
        (state = 'open' AND open_claim_id IS NOT NULL AND open_claim_id = claim_id)
        OR (state <> 'open' AND open_claim_id IS NULL)),
      CONSTRAINT flags_for_somebody_else CHECK (assignee_id IS NULL OR assignee_id <> claimant_id)
    ) ${TABLE}`,
    `CREATE TABLE settlements (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NOT NULL,
      flag_id ${ID} NOT NULL,
      claimant_id ${ID} NOT NULL,
      settler_id ${ID} NOT NULL,
      word ${WORD} NOT NULL,
      reason TEXT NULL,
      convention VARCHAR(200) NULL,
      claim_version_before INT NOT NULL,
      claim_version_after INT NULL,
      claim_before LONGTEXT NOT NULL,
      active_flag_id ${ID} NULL,
      undone_at DATETIME(3) NULL,
      undone_by_id ${ID} NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY settlements_one_in_force (active_flag_id),
      KEY settlements_flag (flag_id, created_at),
      KEY settlements_work (work_id, created_at),
      CONSTRAINT settlements_flag_fk FOREIGN KEY (flag_id, claimant_id) REFERENCES flags (id, claimant_id),
      CONSTRAINT settlements_work_fk FOREIGN KEY (flag_id, work_id) REFERENCES flags (id, work_id),
      CONSTRAINT settlements_settler_fk FOREIGN KEY (settler_id) REFERENCES users (id),
      CONSTRAINT settlements_undoer_fk FOREIGN KEY (undone_by_id) REFERENCES users (id),
      CONSTRAINT settlements_by_somebody_else CHECK (settler_id <> claimant_id),
      CONSTRAINT settlements_word_known CHECK (word IN ('correct', 'stet', 'reword', 'withdraw')),
      CONSTRAINT settlements_reasoned CHECK (
        word NOT IN ('stet', 'reword') OR (reason IS NOT NULL AND CHAR_LENGTH(TRIM(reason)) > 0)),
      CONSTRAINT settlements_in_force CHECK (
        (undone_at IS NULL AND undone_by_id IS NULL AND active_flag_id IS NOT NULL AND active_flag_id = flag_id)
        OR (undone_at IS NOT NULL AND undone_by_id IS NOT NULL AND active_flag_id IS NULL))
    ) ${TABLE}`,
    `CREATE TABLE messages (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NOT NULL,
      flag_id ${ID} NOT NULL,
      author_id ${ID} NOT NULL,
      body TEXT NOT NULL,
      created_at DATETIME(3) NOT NULL,
      KEY messages_flag (flag_id, created_at),
      CONSTRAINT messages_flag_fk FOREIGN KEY (flag_id, work_id) REFERENCES flags (id, work_id),
      CONSTRAINT messages_author_fk FOREIGN KEY (author_id) REFERENCES users (id),
      CONSTRAINT messages_said CHECK (body <> '')
    ) ${TABLE}`,
    `CREATE TABLE waivers (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NOT NULL,
      claim_id ${ID} NOT NULL,
      claim_version INT NOT NULL,
      named_by_id ${ID} NOT NULL,
      reason TEXT NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY waivers_claim_once (claim_id, claim_version),
      KEY waivers_work (work_id, created_at),
      CONSTRAINT waivers_work_fk FOREIGN KEY (work_id) REFERENCES works (id),
      CONSTRAINT waivers_claim_fk FOREIGN KEY (claim_id, claim_version) REFERENCES claim_versions (claim_id, number),
      CONSTRAINT waivers_namer_fk FOREIGN KEY (named_by_id) REFERENCES users (id),
      CONSTRAINT waivers_reasoned CHECK (reason <> '')
    ) ${TABLE}`,
  ]);

export const down = ({ context }: Migration) =>
  dropTables(context, ["waivers", "messages", "settlements", "flags"]);
