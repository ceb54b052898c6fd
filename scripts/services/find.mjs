import { accessSync, constants } from "node:fs";
import path from "node:path";

/** Debian keeps servers in folders that an ordinary user's PATH leaves out. */
const ALSO = ["/usr/sbin", "/usr/local/sbin", "/sbin"];

/** The full path of a program, or null. */
export function find(name, searchPath = process.env.PATH ?? "", also = ALSO) {
  for (const folder of [...searchPath.split(path.delimiter), ...also]) {
    if (folder === "") continue;
    const file = path.join(folder, name);
    try {
      accessSync(file, constants.X_OK);
      return file;
    } catch {
      // not here
    }
  }
  return null;
}
