import { readFileSync } from "node:fs";
import path from "node:path";
import { SentenceError } from "./sentence-error.mjs";
import { projectRoot } from "./settings.mjs";

function lockedPackages(file) {
  try {
    return JSON.parse(readFileSync(path.join(projectRoot, file), "utf8")).packages;
  } catch (error) {
    if (error.code === "ENOENT") return null;
    throw error;
  }
}

/**
 * Whether node_modules holds what package-lock.json asks for. npm writes its own record as the last
 * act of an installation, so a missing record also tells of one that was cut short.
 */
export function packagesAreCurrent() {
  const wanted = lockedPackages("package-lock.json");
  const installed = lockedPackages("node_modules/.package-lock.json");
  if (!wanted || !installed) return false;
  return Object.entries(wanted).every(([folder, entry]) => {
    if (folder === "" || !folder.startsWith("node_modules/")) return true;
    const found = installed[folder];
    // Optional packages are for other machines or were left out by choice of npm.
    return found ? found.version === entry.version : Boolean(entry.optional || entry.devOptional);
  });
}

/** Installs the locked packages unless they are there already. */
export async function ensurePackages(session) {
  if (packagesAreCurrent()) return;
  console.log("Installing packages (about two minutes the first time) …");
  const { code } = await session.run("npm", ["ci", "--include=dev", "--no-audit", "--no-fund"], {
    cwd: projectRoot,
    show: true,
  });
  if (code !== 0) {
    throw new SentenceError("npm ci failed: its message above says why; put it right, try again.");
  }
}
