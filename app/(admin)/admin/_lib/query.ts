/** The page number in an address, from 1; anything else is the first page. */
export function pageOf(value: string | string[] | undefined): number {
  const number = Number(typeof value === "string" ? value : 1);
  return Number.isInteger(number) && number >= 1 && number <= 100_000 ? number : 1;
}

/** One text in an address; a repeated or missing one is empty. */
export const textOf = (value: string | string[] | undefined) =>
  typeof value === "string" ? value.slice(0, 100) : "";
