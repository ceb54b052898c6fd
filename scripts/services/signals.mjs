/** npm does not always pass on how it ended; when it is gone, so are we. */
export function endWithParent(end) {
  if (!process.env.npm_lifecycle_event) return;
  const parent = process.ppid;
  setInterval(() => process.ppid !== parent && end(), 500).unref();
}
