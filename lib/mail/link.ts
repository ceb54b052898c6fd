import { env } from "@/lib/env";

/** The address of a page for a mail: always at APP_URL, whatever host a request named. */
export const mailLink = (path: string): string => new URL(path, env.APP_URL).href;
