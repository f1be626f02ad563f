import { mkdtempSync, readFileSync } from "node:fs";
import { rm } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import { projectRoot } from "./settings.mjs";

const tool = (...words) => path.join(projectRoot, "node_modules", ...words);
const tools = {
  prettier: tool("prettier", "bin", "prettier.cjs"),
  eslint: tool("eslint", "bin", "eslint.js"),
  tsc: tool("typescript", "bin", "tsc"),
  jest: tool("jest", "bin", "jest.js"),
};

/**
 * A check that passes or fails as a whole, such as the format check: counts as one.
 * @returns {Promise<{passed: number, failed: number}>}
 */
export async function wholeCheck(session, name, [program, ...args], env) {
  const started = Date.now();
  const { code, text } = await session.run(process.execPath, [tools[program], ...args], {
    cwd: projectRoot,
    env,
  });
  const seconds = ((Date.now() - started) / 1000).toFixed(0);
  console.log(`${code === 0 ? "passed" : "FAILED"}  ${name} (${seconds} s)`);
  if (code !== 0) console.log(text.trimEnd());
  return code === 0 ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };
}

/**
 * Runs Jest and counts from its own report. A test file that could not run, a test that was skipped
 * or left to do, and a Jest that ended without a report each count as a failure: none of them says
 * that the product works.
 */
export async function jestCheck(session, args, env) {
  const folder = mkdtempSync(path.join(os.tmpdir(), "loopwright-report-"));
  const report = path.join(folder, "report.json");
  try {
    const { code } = await session.run(
      process.execPath,
      [tools.jest, "--ci", "--json", `--outputFile=${report}`, ...args],
      // Jest repeats the whole report on its output; the readable lines go to the error stream.
      { cwd: projectRoot, env, show: "errors" },
    );
    return countJest(report, code);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

function countJest(file, code) {
  let report;
  try {
    report = JSON.parse(readFileSync(file, "utf8"));
  } catch (error) {
    console.log(`FAILED  Jest left no report: ${error.message}`);
    return { passed: 0, failed: 1 };
  }
  const unrun = report.numPendingTests + report.numTodoTests;
  if (unrun > 0) console.log(`FAILED  ${unrun} tests were skipped or left to do.`);
  const failed = report.numFailedTests + report.numRuntimeErrorTestSuites + unrun;
  // Jest can fail beyond its tests, such as in its set-up or by leaving something open.
  const beyond = failed === 0 && (code !== 0 || report.numTotalTests === 0) ? 1 : 0;
  if (beyond)
    console.log(`FAILED  Jest ended with code ${code} after ${report.numTotalTests} tests.`);
  return { passed: report.numPassedTests, failed: failed + beyond };
}
