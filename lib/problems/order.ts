/**
 * The new positions after one row has changed places with its neighbour; positions are made 0, 1, 2 … on the way, so
 * that gaps and ties left by older data disappear. Empty when there is no neighbour on that side.
 */
export function swapNeighbours(
  rows: readonly { id: string; position: number }[],
  id: string,
  to: "earlier" | "later",
): { id: string; position: number }[] {
  const at = rows.findIndex((row) => row.id === id);
  const other = to === "earlier" ? at - 1 : at + 1;
  const moved = rows[at];
  const neighbour = rows[other];
  if (!moved || !neighbour) return [];
  const order = [...rows];
  order[at] = neighbour;
  order[other] = moved;
  return order.flatMap((row, position) => (row.position === position ? [] : [{ id: row.id, position }]));
}
