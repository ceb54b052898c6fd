/**
 * The address a request came from: the last entry of X-Forwarded-For, which is the one that the nearest proxy saw
 * (without a proxy, Next fills it from the socket). Earlier entries are whatever the sender liked to write.
 */
export function addressOf(headers: Headers | Record<string, unknown> | undefined): string {
  const value = headers instanceof Headers ? headers.get("x-forwarded-for") : headers?.["x-forwarded-for"];
  const last = typeof value === "string" ? value.split(",").at(-1)?.trim() : "";
  return last ? network(last) : "unknown";
}

/** An IPv6 customer has a whole /64 at hand: it counts as one address. */
function network(address: string): string {
  const plain = address.replace(/^::ffff:(?=\d+\.)/i, "");
  if (!plain.includes(":")) return plain.slice(0, 64);
  const [head = "", tail] = plain.split("::");
  const start = head.split(":").filter(Boolean);
  const end = (tail ?? "").split(":").filter(Boolean);
  const filling =
    tail === undefined ? [] : Array<string>(Math.max(0, 8 - start.length - end.length)).fill("0");
  return [...start, ...filling, ...end].slice(0, 4).join(":").slice(0, 64);
}
