import { EXACT_TEXT, HASH, ID, TABLE, WORD } from "./shared/columns";
import { dropTables, statements, type Migration } from "./shared/statements";

/**
 * Chapters, problems, sources and claims. A row that belongs to a chapter points at (chapter, work) together, so
 * that no claim can sit in the chapter of another work.
 */
export const up = ({ context }: Migration) =>
  statements(context, [
    `CREATE TABLE chapters (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NOT NULL,
      number INT NOT NULL,
      title VARCHAR(200) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY chapters_number (work_id, number),
      UNIQUE KEY chapters_of_work (id, work_id),
      CONSTRAINT chapters_work_fk FOREIGN KEY (work_id) REFERENCES works (id),
      CONSTRAINT chapters_title_given CHECK (title <> '')
    ) ${TABLE}`,
    `CREATE TABLE problems (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NOT NULL,
      chapter_id ${ID} NOT NULL,
      label VARCHAR(40) ${EXACT_TEXT} NOT NULL,
      statement TEXT ${EXACT_TEXT} NOT NULL,
      position INT NOT NULL,
      version INT NOT NULL DEFAULT 0,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY problems_label (chapter_id, label),
      UNIQUE KEY problems_of_chapter (id, chapter_id, work_id),
      KEY problems_position (chapter_id, position),
      CONSTRAINT problems_chapter_fk FOREIGN KEY (chapter_id, work_id) REFERENCES chapters (id, work_id),
      CONSTRAINT problems_label_given CHECK (label <> '')
    ) ${TABLE}`,
    `CREATE TABLE sources (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NOT NULL,
      chapter_id ${ID} NOT NULL,
      name VARCHAR(255) NOT NULL,
      format ${WORD} NOT NULL,
      bytes LONGBLOB NOT NULL,
      size INT NOT NULL,
      sha256 ${HASH} NOT NULL,
      uploaded_by_id ${ID} NOT NULL,
      state ${WORD} NOT NULL DEFAULT 'received',
      accepted_rows INT NULL,
      accepted_at DATETIME(3) NULL,
      accepted_by_id ${ID} NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY sources_of_work (id, work_id),
      KEY sources_chapter (chapter_id, created_at),
      KEY sources_bytes (work_id, sha256),
      CONSTRAINT sources_chapter_fk FOREIGN KEY (chapter_id, work_id) REFERENCES chapters (id, work_id),
      CONSTRAINT sources_uploader_fk FOREIGN KEY (uploaded_by_id) REFERENCES users (id),
      CONSTRAINT sources_accepter_fk FOREIGN KEY (accepted_by_id) REFERENCES users (id),
      CONSTRAINT sources_state_known CHECK (state IN ('received', 'accepted', 'set-aside')),
      CONSTRAINT sources_format_known CHECK (format IN ('csv', 'json', 'unknown')),
      CONSTRAINT sources_size_true CHECK (size = OCTET_LENGTH(bytes))
    ) ${TABLE}`,
    `CREATE TABLE claims (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NOT NULL,
      chapter_id ${ID} NOT NULL,
      problem_id ${ID} NOT NULL,
      ref VARCHAR(60) ${EXACT_TEXT} NOT NULL,
      position INT NOT NULL,
      current INT NOT NULL DEFAULT 1,
      quantity TEXT ${EXACT_TEXT} NOT NULL,
      claimed TEXT ${EXACT_TEXT} NOT NULL,
      note VARCHAR(500) NULL,
      page VARCHAR(20) NULL,
      claimant_id ${ID} NOT NULL,
      orbit_key VARCHAR(191) CHARACTER SET ascii COLLATE ascii_bin NULL,
      verdict ${WORD} NULL,
      finding_id ${ID} NULL,
      withdrawn_at DATETIME(3) NULL,
      version INT NOT NULL DEFAULT 0,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY claims_ref (work_id, ref),
      UNIQUE KEY claims_of_work (id, work_id),
      KEY claims_position (chapter_id, position),
      KEY claims_chapter_verdict (chapter_id, withdrawn_at, verdict),
      KEY claims_problem (problem_id, position),
      KEY claims_orbit (work_id, orbit_key),
      KEY claims_verdict (work_id, verdict),
      KEY claims_claimant (claimant_id, verdict),
      CONSTRAINT claims_problem_fk FOREIGN KEY (problem_id, chapter_id, work_id)
        REFERENCES problems (id, chapter_id, work_id) ON UPDATE CASCADE,
      CONSTRAINT claims_claimant_fk FOREIGN KEY (claimant_id) REFERENCES users (id),
      CONSTRAINT claims_ref_given CHECK (ref <> ''),
      CONSTRAINT claims_verdict_known CHECK (verdict IS NULL OR verdict IN
        ('confirmed', 'confirmed-not-house-form', 'discrepant', 'contradicted', 'unreadable', 'undecided'))
    ) ${TABLE}`,
    `CREATE TABLE claim_versions (
      id ${ID} NOT NULL PRIMARY KEY,
      work_id ${ID} NOT NULL,
      claim_id ${ID} NOT NULL,
      number INT NOT NULL,
      quantity TEXT ${EXACT_TEXT} NOT NULL,
      claimed TEXT ${EXACT_TEXT} NOT NULL,
      note VARCHAR(500) NULL,
      page VARCHAR(20) NULL,
      author_id ${ID} NOT NULL,
      origin ${WORD} NOT NULL,
      source_id ${ID} NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY claim_versions_number (claim_id, number),
      KEY claim_versions_source (source_id, work_id),
      CONSTRAINT claim_versions_claim_fk FOREIGN KEY (claim_id) REFERENCES claims (id),
      CONSTRAINT claim_versions_author_fk FOREIGN KEY (author_id) REFERENCES users (id),
      CONSTRAINT claim_versions_source_fk FOREIGN KEY (source_id, work_id) REFERENCES sources (id, work_id),
      CONSTRAINT claim_versions_origin_known CHECK (origin IN ('typed', 'source', 'corrected', 'undone', 'restored'))
    ) ${TABLE}`,
    `CREATE TRIGGER claim_versions_kept BEFORE UPDATE ON claim_versions FOR EACH ROW
      SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'A version of a claim is never changed.'`,
  ]);

export const down = async ({ context }: Migration) => {
  await statements(context, ["DROP TRIGGER IF EXISTS claim_versions_kept"]);
  await dropTables(context, ["claim_versions", "claims", "sources", "problems", "chapters"]);
};
