/** Lines of one page of a galley: claims, and one line for a problem that has none. */
export const LINES_PER_PAGE = 60;

/** A stretch of one problem on a page: its claims from `from` up to `to`. */
export type Stretch = { problemId: string; from: number; to: number };

/**
 * Divides a chapter into pages, a problem kept whole where it fits on one page; a longer one goes on over the next.
 * There is always at least one page.
 */
export function galleyPages(
  problems: readonly { id: string; claims: number }[],
  linesPerPage: number = LINES_PER_PAGE,
): Stretch[][] {
  const pages: Stretch[][] = [];
  let page: Stretch[] = [];
  let used = 0;
  const turn = () => {
    if (page.length > 0) pages.push(page);
    page = [];
    used = 0;
  };
  for (const { id, claims } of problems) {
    const height = Math.max(1, claims);
    if (used > 0 && used + height > linesPerPage) turn();
    for (let from = 0; from === 0 || from < claims; from += linesPerPage) {
      const to = Math.min(claims, from + linesPerPage);
      page.push({ problemId: id, from, to });
      used += Math.max(1, to - from);
      if (used >= linesPerPage) turn();
    }
  }
  turn();
  return pages.length > 0 ? pages : [[]];
}
