import { readdirSync, statSync } from "node:fs";
import path from "node:path";
import { Router, type Request, type RequestHandler, type Response } from "express";
import { NotFound } from "./errors";

/** Which compressed twins of a file stand beside it, made by the build. */
interface ClientFile {
  readonly br: boolean;
  readonly gzip: boolean;
}

/** Names with a content hash or a version: such a file never changes, so it is kept for good. */
const immutableName = /^\/_expo\/static\/|[.-][0-9a-f]{16,}\.|-\d+\.\d+\.\d+\./;

function listFiles(folder: string): Map<string, ClientFile> {
  const names = new Set(
    readdirSync(folder, { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile())
      .map((entry) => {
        const file = path.relative(folder, path.join(entry.parentPath, entry.name));
        return `/${file.split(path.sep).join("/")}`;
      }),
  );
  return new Map(
    [...names]
      .filter((name) => !/\.(br|gz)$/.test(name))
      .map((name) => [name, { br: names.has(`${name}.br`), gzip: names.has(`${name}.gz`) }]),
  );
}

/** The list is read again when the build replaced the page, so a rebuild needs no restart. */
function fileList(folder: string): () => Map<string, ClientFile> {
  let files = new Map<string, ClientFile>();
  let builtAt = -1;
  return () => {
    const page = statSync(path.join(folder, "index.html"), { throwIfNoEntry: false });
    const stamp = page?.mtimeMs ?? 0;
    if (stamp !== builtAt) {
      files = page ? listFiles(folder) : new Map();
      builtAt = stamp;
    }
    return files;
  };
}

function send(
  folder: string,
  name: string,
  file: ClientFile,
  request: Request,
  response: Response,
) {
  const encoding = request.acceptsEncodings(
    ...(file.br ? ["br"] : []),
    ...(file.gzip ? ["gzip"] : []),
    "identity",
  );
  const suffix = encoding === "br" ? ".br" : encoding === "gzip" ? ".gz" : "";
  response.vary("Accept-Encoding").type(path.extname(name));
  if (suffix !== "" && typeof encoding === "string") response.set("Content-Encoding", encoding);
  response.set(
    "Cache-Control",
    immutableName.test(name) ? "public, max-age=31536000, immutable" : "no-cache",
  );
  response.sendFile(`.${name}${suffix}`, { root: folder, cacheControl: false, dotfiles: "allow" });
}

/**
 * Serves the built client. Only files that the build listed are reachable, so no path can climb out
 * of the folder. Every other address without an extension is a screen and gets the page; a missing
 * file is a 404, because a page in its place would be run as a script.
 */
export function clientFiles(folder: string): RequestHandler {
  const current = fileList(folder);
  const router = Router();
  router.get("/{*path}", (request, response) => {
    const files = current();
    const name = decodeURIComponent(request.path);
    const file = name === "/index.html" ? undefined : files.get(name);
    if (file) return send(folder, name, file, request, response);
    const page = files.get("/index.html");
    if (path.extname(name) !== "" && name !== "/index.html") throw new NotFound("file");
    if (page === undefined) throw new NotFound("page: the web client has not been built");
    return send(folder, "/index.html", page, request, response);
  });
  return router;
}
