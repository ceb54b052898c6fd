import { HASH, ID, TABLE } from "./shared/columns";
import { dropTables, statements, type Migration } from "./shared/statements";

/** People and the sign-ins that can be ended at once. */
export const up = ({ context }: Migration) =>
  statements(context, [
    `CREATE TABLE users (
      id ${ID} NOT NULL PRIMARY KEY,
      email VARCHAR(254) NOT NULL,
      name VARCHAR(120) NOT NULL,
      password_hash VARCHAR(255) CHARACTER SET ascii COLLATE ascii_bin NULL,
      is_admin TINYINT(1) NOT NULL DEFAULT 0,
      disabled_at DATETIME(3) NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY users_email (email),
      KEY users_created (created_at, id),
      CONSTRAINT users_email_given CHECK (email <> ''),
      CONSTRAINT users_name_given CHECK (name <> '')
    ) ${TABLE}`,
    `CREATE TABLE sessions (
      id ${ID} NOT NULL PRIMARY KEY,
      user_id ${ID} NOT NULL,
      token_hash ${HASH} NOT NULL,
      user_agent VARCHAR(255) NULL,
      last_used_at DATETIME(3) NOT NULL,
      expires_at DATETIME(3) NOT NULL,
      revoked_at DATETIME(3) NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY sessions_token (token_hash),
      KEY sessions_user (user_id, revoked_at),
      KEY sessions_expiry (expires_at),
      CONSTRAINT sessions_user_fk FOREIGN KEY (user_id) REFERENCES users (id) ON DELETE CASCADE
    ) ${TABLE}`,
  ]);

export const down = ({ context }: Migration) => dropTables(context, ["sessions", "users"]);
