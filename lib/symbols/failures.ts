/** A result is no finite sum of rational·√(square-free)·π^(n/2)·i^k. The message is a sentence for people. */
export class OutsideDomain extends Error {
  override readonly name = "OutsideDomain";
}

/** A stated limit would be passed. Thrown before the work begins; the message is a sentence for people. */
export class TooCostly extends Error {
  override readonly name = "TooCostly";
}

/** Two independent routes gave different values: an alarm about this program, never a verdict on a claim. */
export class RouteDisagreement extends Error {
  override readonly name = "RouteDisagreement";
  constructor(
    readonly quantity: string,
    readonly values: readonly { readonly name: string; readonly text: string }[],
    readonly version: string,
  ) {
    const said = values.map((v) => `${v.name}: ${v.text}`).join("; ");
    super(`Two routes disagree on ${quantity} (${said}). Engine: ${version}.`);
  }
}
