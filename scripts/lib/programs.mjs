import { accessSync, constants } from "node:fs";
import path from "node:path";

// Debian keeps servers such as mariadbd in sbin, which is not on an ordinary user's PATH.
const extraFolders = ["/usr/sbin", "/usr/local/sbin", "/sbin"];

/** The full path of the first of these program names that can be run here, or null. */
export function findProgram(...names) {
  const folders = [...(process.env.PATH ?? "").split(path.delimiter), ...extraFolders];
  for (const name of names) {
    for (const folder of folders.filter(Boolean)) {
      const candidate = path.join(folder, name);
      try {
        accessSync(candidate, constants.X_OK);
        return candidate;
      } catch {
        continue; // not in this folder, look in the next
      }
    }
  }
  return null;
}
