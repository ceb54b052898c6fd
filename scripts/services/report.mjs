/** A failure whose message is one sentence that says what to do; no stack is shown with it. */
export class Fault extends Error {}

/** Turns a failure of the system into the sentence a person needs, or gives it back as it is. */
export function explain(error, root) {
  if (error?.code === "ENOSPC" || error?.code === "EDQUOT")
    return new Fault(`The disk that holds ${root} is full: free some space and start again.`);
  if (error?.code === "EROFS" || error?.code === "EACCES")
    return new Fault(
      `${error.path ?? root} cannot be written: make it writable for this user, or clone to a folder that is, and start again.`,
    );
  return error;
}

const seconds = (since) => `${((performance.now() - since) / 1000).toFixed(1)} s`;

/**
 * Does one step and prints one line for it: what it was, what came of it, and how long it took.
 * @param {string} name shown first, such as "Packages"
 * @param {() => Promise<string | void>} work gives what came of it, such as "up to date"
 */
export async function step(name, work) {
  const since = performance.now();
  const outcome = (await work()) ?? "done";
  console.log(`  ${name.padEnd(13)} ${outcome.padEnd(52)} ${seconds(since).padStart(7)}`);
}
