/** Runs once before the first request. A server that is set up wrongly says so and ends, instead of answering 500. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME === "nodejs")
    await (await import("./instrumentation-node")).beforeFirstRequest();
}
