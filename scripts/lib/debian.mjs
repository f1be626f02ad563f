import { findProgram } from "./programs.mjs";
import { SentenceError } from "./sentence-error.mjs";

/**
 * Makes sure that programs from a Debian package are here, installing the package when we may.
 * @param {string} packageName Debian's name of the package.
 * @param {string[][]} programs each entry lists the names one program is known by.
 * @throws SentenceError saying what to install, where we are not allowed to or cannot.
 */
export async function ensureDebianPackage(session, packageName, programs) {
  const isComplete = () => programs.every((names) => findProgram(...names) !== null);
  if (isComplete()) return;
  const apt = findProgram("apt-get");
  if (process.getuid?.() !== 0 || apt === null) {
    throw new SentenceError(
      `Loopwright needs ${packageName}: install it with "sudo apt-get install --no-install-recommends ${packageName}" and start again.`,
    );
  }
  console.log(`Installing Debian's ${packageName} …`);
  const options = { env: { ...process.env, DEBIAN_FRONTEND: "noninteractive" } };
  const update = await session.run(apt, ["update", "-q"], options);
  const install = await session.run(
    apt,
    ["install", "-y", "-q", "--no-install-recommends", packageName],
    options,
  );
  if (install.code === 0 && isComplete()) return;
  console.error([update, install].map(({ text }) => text.trimEnd()).join("\n"));
  throw new SentenceError(
    `apt-get could not install ${packageName}: install it by hand and start again.`,
  );
}

export const ensureMariadb = (session) =>
  ensureDebianPackage(session, "mariadb-server", [
    ["mariadbd", "mysqld"],
    ["mariadb-install-db"],
    ["mariadb", "mysql"],
  ]);

export const ensureChromium = (session) => ensureDebianPackage(session, "chromium", [["chromium"]]);

/** The API guide is written with it, and a test runs the guide's lines. */
export const ensureCurl = (session) => ensureDebianPackage(session, "curl", [["curl"]]);
