// npm test: every check of the project; the last line is "N passed, N failed".
import { jestCheck, wholeCheck } from "./lib/checks.mjs";
import { ensureChromium, ensureCurl, ensureMariadb } from "./lib/debian.mjs";
import { ensurePackages } from "./lib/packages.mjs";
import { SentenceError } from "./lib/sentence-error.mjs";
import { openSession } from "./lib/session.mjs";
import { startThrowAwayDatabase } from "./lib/throw-away-database.mjs";
import { ensureWebBuild } from "./lib/web-build.mjs";

// A developer's own settings must not leak into the tests.
const bare = Object.fromEntries(
  Object.entries(process.env).filter(([name]) => !/^LOOPWRIGHT_|^NODE_ENV$/.test(name)),
);

const session = openSession();
const total = { passed: 0, failed: 0 };
const count = ({ passed, failed }) => {
  total.passed += passed;
  total.failed += failed;
};

/** Format, lint and types: two of them at a time, one for each core of a small machine. */
async function staticChecks() {
  const types = wholeCheck(session, "types", ["tsc", "--noEmit"], bare);
  count(await wholeCheck(session, "format", ["prettier", "--check", "."], bare));
  count(await wholeCheck(session, "lint", ["eslint", ".", "--max-warnings", "0"], bare));
  count(await types);
}

try {
  await ensurePackages(session);
  await ensureMariadb(session);
  await ensureChromium(session);
  await ensureCurl(session);
  await staticChecks();
  const database = await startThrowAwayDatabase();
  session.atEnd(database.stop);
  const env = { ...bare, LOOPWRIGHT_TEST_DB_PORT: String(database.port) };
  // On two cores Jest alone would use one; the kill test mostly waits for servers to boot.
  const projects = ["--selectProjects", "client", "domain", "server"];
  count(await jestCheck(session, [...projects, "--maxWorkers=2"], env));
  await ensureWebBuild(session);
  // One browser at a time: two on two cores make each other's waits run out.
  count(await jestCheck(session, ["--selectProjects", "browser", "--runInBand"], env));
} catch (error) {
  console.error(error instanceof SentenceError ? error.message : error);
  total.failed += 1;
}
await session.close();
process.exitCode = total.failed === 0 ? 0 : 1;
console.log(`${total.passed} passed, ${total.failed} failed`);
