import { createConnection } from "mariadb";

type Settings = {
  flush: number | string;
  doublewrite: number | string;
  mode: string;
  files: number | string;
};

const isOff = (value: number | string) => value === "OFF" || Number(value) === 0;

/**
 * Sentences about settings under which MariaDB could lose what it has acknowledged, or change values without a word.
 * @returns [] when all is well, and also when the server cannot be reached: that is for the health check to tell.
 */
export async function durabilityFaults(databaseUrl: string): Promise<string[]> {
  const url = new URL(databaseUrl);
  const connection = await createConnection({
    host: url.hostname,
    port: Number(url.port || 3306),
    user: decodeURIComponent(url.username),
    password: decodeURIComponent(url.password),
    connectTimeout: 3_000,
  }).catch(() => null);
  if (connection === null) return [];
  try {
    const [row] = await connection.query<Settings[]>(
      "select @@innodb_flush_log_at_trx_commit flush, @@innodb_doublewrite doublewrite, @@global.sql_mode mode, @@local_infile files",
    );
    return row === undefined ? [] : faultsOf(row);
  } finally {
    await connection.end();
  }
}

/** The sentences for one server's settings. */
export function faultsOf({ flush, doublewrite, mode, files }: Settings): string[] {
  const faults: string[] = [];
  if (![1, 3].includes(Number(flush)))
    faults.push(
      `MariaDB's innodb_flush_log_at_trx_commit is ${flush}, which can lose saved work in a crash: set it to 1.`,
    );
  if (isOff(doublewrite))
    faults.push("MariaDB's innodb_doublewrite is off, which can damage tables in a crash: set it to ON.");
  if (!/STRICT_(TRANS|ALL)_TABLES/.test(mode))
    faults.push(
      "MariaDB's sql_mode is not strict, so values could be cut short unnoticed: add STRICT_TRANS_TABLES.",
    );
  if (!isOff(files))
    faults.push("MariaDB's local_infile is on, which lets a statement read files: set it to OFF.");
  return faults;
}
