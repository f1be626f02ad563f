import type { Role } from "@shared/contracts/people";
import type { Application } from "./application";
import { emailOf, password } from "./people";

/** The API as a script uses it; paths start after /api/v1. An error answer throws with its text. */
export interface Api {
  get<T>(path: string): Promise<T>;
  post<T>(path: string, body?: object): Promise<T>;
  put<T>(path: string, body?: object): Promise<T>;
  patch<T>(path: string, body?: object): Promise<T>;
  upload<T>(path: string, files: { name: string; bytes: Uint8Array }[]): Promise<T>;
}

/** Signs in over HTTP, for making what a test needs before it opens the browser. */
export async function apiAs(application: Application, role: Role): Promise<Api> {
  const base = `${application.address}/api/v1`;
  const signedIn = await fetch(`${base}/session`, {
    method: "POST",
    headers: { "content-type": "application/json" },
    body: JSON.stringify({ email: emailOf(role), password }),
  });
  if (!signedIn.ok) throw new Error(`Sign-in as ${role}: ${await signedIn.text()}`);
  const cookie = signedIn.headers
    .getSetCookie()
    .map((line) => line.split(";")[0])
    .join("; ");

  async function call<T>(method: string, path: string, init: RequestInit = {}): Promise<T> {
    const headers = new Headers(init.headers);
    headers.set("cookie", cookie);
    headers.set("X-Loopwright-Request", "1");
    const answer = await fetch(`${base}${path}`, { ...init, method, headers });
    const text = await answer.text();
    if (!answer.ok) throw new Error(`${method} ${path}: ${answer.status} ${text}`);
    return (text === "" ? undefined : JSON.parse(text)) as T;
  }
  const json = (body?: object): RequestInit => ({
    headers: { "content-type": "application/json" },
    body: JSON.stringify(body ?? {}),
  });
  return {
    get: (path) => call("GET", path),
    post: (path, body) => call("POST", path, json(body)),
    put: (path, body) => call("PUT", path, json(body)),
    patch: (path, body) => call("PATCH", path, json(body)),
    upload(path, files) {
      const form = new FormData();
      for (const { name, bytes } of files)
        form.append("file", new Blob([new Uint8Array(bytes)]), name);
      return call("POST", path, { body: form });
    },
  };
}
