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

/** Runs one after the other: a lane for each core of a small machine. */
async function lane(...steps) {
  for (const step of steps) await step();
}

/** Format, lint and types, and the client that the browser tests need: in two lanes much of a length. */
async function checksAndBuild() {
  const check = (name, command) => async () =>
    count(await wholeCheck(session, name, command, bare));
  const lanes = await Promise.allSettled([
    lane(
      check("lint", ["eslint", ".", "--max-warnings", "0"]),
      check("format", ["prettier", "--check", "."]),
    ),
    lane(check("types", ["tsc", "--noEmit"]), () => ensureWebBuild(session)),
  ]);
  for (const { reason } of lanes) if (reason) throw reason;
}

try {
  await ensurePackages(session);
  await ensureMariadb(session);
  await ensureChromium(session);
  await ensureCurl(session);
  await checksAndBuild();
  const database = await startThrowAwayDatabase();
  session.atEnd(database.stop);
  const env = { ...bare, LOOPWRIGHT_TEST_DB_PORT: String(database.port) };
  // One for each core of a small machine, and one for the kill test, which mostly waits.
  const projects = ["--selectProjects", "client", "domain", "server"];
  count(await jestCheck(session, [...projects, "--maxWorkers=3"], env));
  // One browser at a time: two on two cores make each other's waits run out.
  count(await jestCheck(session, ["--selectProjects", "browser", "--runInBand"], env));
} catch (error) {
  console.error(error instanceof SentenceError ? error.message : error);
  total.failed += 1;
}
await session.close();
process.exitCode = total.failed === 0 ? 0 : 1;
console.log(`${total.passed} passed, ${total.failed} failed`);
