/** What is taken of one key file. The page, the route and the tests read these. */
export const SOURCE_LIMITS = {
  bytes: 2 * 1024 * 1024,
  /** Characters of a file's name, and bytes when it is sent back. */
  name: 255,
  /** A body that takes longer than this is given up. */
  milliseconds: 60_000,
  /** Uploads of one person in an hour. */
  uploadsPerHour: 120,
  endings: [".csv", ".json"],
} as const;

/** "2 MiB" */
export const sizeInWords = (bytes: number): string =>
  bytes < 1024
    ? `${bytes} bytes`
    : bytes < 1024 * 1024
      ? `${(bytes / 1024).toFixed(bytes < 10_240 ? 1 : 0)} KiB`
      : `${(bytes / 1024 / 1024).toFixed(bytes % (1024 * 1024) === 0 ? 0 : 1)} MiB`;
