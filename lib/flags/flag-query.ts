import { z } from "zod";

export const FLAGS_PER_PAGE = 25;

/** Deeper pages are refused: a filter finds a flag faster than leafing does. */
export const LAST_PAGE = 400;

export const FLAG_SORTS = ["place", "age", "verdict", "claimant", "assignee"] as const;
export const FLAG_STATES = ["open", "settled", "superseded", "all"] as const;
export const FLAG_VERDICTS = ["discrepant", "contradicted", "unreadable"] as const;

/** What the queue's address may say. Every field has a value that means "not asked for". */
export const FlagQuery = z.object({
  state: z.enum(FLAG_STATES).default("open"),
  verdict: z.enum(FLAG_VERDICTS).optional(),
  chapter: z.uuid().optional(),
  /** a person's id, "me" or "nobody" */
  assignee: z.union([z.literal("me"), z.literal("nobody"), z.uuid()]).optional(),
  slip: z
    .string()
    .regex(/^[a-z0-9-]{1,40}$/)
    .optional(),
  sort: z.enum(FLAG_SORTS).default("place"),
  order: z.enum(["ascending", "descending"]).default("ascending"),
  page: z
    .union([
      z.number(),
      z
        .string()
        .regex(/^\d{1,4}$/)
        .transform(Number),
    ])
    .pipe(z.number().int().min(1).max(LAST_PAGE))
    .default(1),
});
export type FlagQuery = z.output<typeof FlagQuery>;

type Params = Record<string, string | string[] | undefined>;

/** Reads a page's address: a part that makes no sense is left out, so that an old bookmark still shows a list. */
export function readFlagQuery(params: Params): FlagQuery {
  const sound = Object.entries(FlagQuery.shape).flatMap(([name, shape]) => {
    const given = params[name];
    return typeof given === "string" && given !== "" && shape.safeParse(given).success ? [[name, given]] : [];
  });
  return FlagQuery.parse(Object.fromEntries(sound));
}

/** The address of a query; what is at its default is left out. `changes` replaces fields and, unless it names one, goes back to the first page. */
export function flagQueryText(
  query: FlagQuery,
  changes: Partial<Record<keyof FlagQuery, string | number | undefined>> = {},
): string {
  const merged: Record<string, string | number | undefined> = { ...query, page: 1, ...changes };
  const defaults: Record<string, string | number> = {
    state: "open",
    sort: "place",
    order: "ascending",
    page: 1,
  };
  const params = new URLSearchParams();
  for (const name of Object.keys(FlagQuery.shape)) {
    const value = merged[name];
    if (value !== undefined && value !== "" && value !== defaults[name]) params.set(name, String(value));
  }
  return params.size > 0 ? `?${params}` : "";
}

/** Whether anything but the state narrows the list. */
export function isNarrowed({ verdict, chapter, assignee, slip }: FlagQuery): boolean {
  return Boolean(verdict ?? chapter ?? assignee ?? slip);
}
