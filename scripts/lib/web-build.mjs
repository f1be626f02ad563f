import { createHash } from "node:crypto";
import { existsSync, readFileSync, readdirSync, rmSync, statSync, writeFileSync } from "node:fs";
import { copyFile, rename, rm } from "node:fs/promises";
import path from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { compressFolder } from "./compress.mjs";
import { startTicks } from "./processes.mjs";
import { SentenceError } from "./sentence-error.mjs";
import { projectRoot } from "./settings.mjs";

const sourceFolders = ["app", "features", "shared", "assets", "public"];
const sourceFiles = [
  "index.ts",
  "app.json",
  "babel.config.js",
  "metro.config.js",
  "package-lock.json",
  "tsconfig.json",
  "scripts/lib/web-build.mjs",
  "scripts/lib/compress.mjs",
];
const dist = path.join(projectRoot, "dist");
const stampFile = path.join(dist, ".build-stamp");

/** What the built client depends on, as one hash. Tests and the copied CanvasKit do not count. */
export function clientSourceHash() {
  const hash = createHash("sha256");
  const files = sourceFolders.flatMap((folder) =>
    readdirSync(path.join(projectRoot, folder), { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile() && !/\.test\.tsx?$|^canvaskit/.test(entry.name))
      .map((entry) => path.relative(projectRoot, path.join(entry.parentPath, entry.name))),
  );
  for (const file of [...files.sort(), ...sourceFiles]) {
    hash
      .update(`${file}\0`)
      .update(readFileSync(path.join(projectRoot, file)))
      .update("\0");
  }
  return hash.digest("hex");
}

const builtHash = () => (existsSync(stampFile) ? readFileSync(stampFile, "utf8") : null);

/**
 * Puts CanvasKit's program where the client's loader looks for it. The file name carries the
 * version, so browsers may keep it for ever.
 */
export async function copyCanvasKit() {
  const home = path.join(projectRoot, "node_modules", "canvaskit-wasm");
  const { version } = JSON.parse(readFileSync(path.join(home, "package.json"), "utf8"));
  const name = `canvaskit-${version}.wasm`;
  const target = path.join(projectRoot, "public", name);
  for (const old of readdirSync(path.dirname(target))) {
    if (/^canvaskit.*\.wasm$/.test(old) && old !== name)
      rmSync(path.join(projectRoot, "public", old));
  }
  if (!existsSync(target)) {
    await copyFile(path.join(home, "bin", "full", "canvaskit.wasm"), `${target}.part`);
    await rename(`${target}.part`, target); // a copy cut short never carries the final name
  }
}

/** Builds the web client into dist/ unless what is there came from exactly these sources. */
export async function ensureWebBuild(session) {
  const release = await takeBuildLock();
  try {
    const wanted = clientSourceHash();
    if (builtHash() === wanted) return;
    console.log("Building the web client (one to two minutes the first time) …");
    await copyCanvasKit();
    const unfinished = path.join(projectRoot, "dist.new");
    await rm(unfinished, { recursive: true, force: true });
    const { code, text } = await session.run(
      process.execPath,
      [
        path.join(projectRoot, "node_modules", "expo", "bin", "cli"),
        ...["export", "--platform", "web", "--output-dir", unfinished],
      ],
      {
        cwd: projectRoot,
        env: { ...process.env, EXPO_OFFLINE: "1", EXPO_NO_TELEMETRY: "1", CI: "1" },
      },
    );
    if (code !== 0) {
      throw new SentenceError(
        `The web client did not build; Expo's last words:\n${text.slice(-6000)}`,
      );
    }
    await compressFolder(unfinished);
    writeFileSync(path.join(unfinished, ".build-stamp"), wanted);
    await rm(dist, { recursive: true, force: true });
    await rename(unfinished, dist);
  } finally {
    release();
  }
}

/** Two builds at once would write into each other's folder: the second waits for the first. */
async function takeBuildLock() {
  const file = path.join(projectRoot, "dist.lock");
  const mine = JSON.stringify({ pid: process.pid, ticks: startTicks(process.pid) });
  for (;;) {
    try {
      writeFileSync(file, mine, { flag: "wx" });
      return () => rmSync(file, { force: true });
    } catch (error) {
      if (error.code !== "EEXIST") throw error;
    }
    if (isVoidLock(file)) rmSync(file, { force: true });
    else await sleep(300);
  }
}

function isVoidLock(file) {
  try {
    const { pid, ticks } = JSON.parse(readFileSync(file, "utf8"));
    return startTicks(pid) !== ticks;
  } catch (error) {
    if (error.code === "ENOENT") return false; // just released
    if (!(error instanceof SyntaxError)) throw error;
    // Empty between its creation and its writing; empty for longer, its maker was killed there.
    const { mtimeMs } = statSync(file, { throwIfNoEntry: false }) ?? { mtimeMs: Date.now() };
    return Date.now() - mtimeMs > 10_000;
  }
}
