import { endpoints } from "@server/routes";
import { testApp } from "@server/testing/test-app";
import { documentPath } from "./openapi";

const app = testApp();

interface Document {
  openapi: string;
  paths: Record<string, Record<string, { operationId: string }>>;
}

/** What the running router takes, asked of the router itself rather than of our list. */
async function isRouted(method: string, path: string): Promise<boolean> {
  const address = `/api/v1${path.replace(/:\w+/g, "1")}`;
  const answer = await app.anonymous[method as "get"](address);
  return answer.body.detail !== "There is no such address in the API.";
}

it("holds every route, and no route that is not there", async () => {
  const { body } = await app.anonymous.get("/api/v1/openapi.json").expect(200);
  const document = body as Document;
  expect(document.openapi).toBe("3.1.0");
  const said = Object.entries(document.paths).flatMap(([path, operations]) =>
    Object.keys(operations).map((method) => `${method} ${path}`),
  );
  const served = endpoints.map(
    ({ contract }) => `${contract.method} ${documentPath(contract.path)}`,
  );
  expect(said.sort()).toEqual(served.sort());
  for (const { contract } of endpoints)
    expect([contract.operationId, await isRouted(contract.method, contract.path)]).toEqual([
      contract.operationId,
      true,
    ]);
});

it("names every operation once and every parameter of a path", () => {
  const ids = endpoints.map(({ contract }) => contract.operationId);
  expect(new Set(ids).size).toBe(ids.length);
  for (const { contract } of endpoints) {
    const inPath = [...contract.path.matchAll(/:(\w+)/g)].map((match) => match[1]);
    const shape = "shape" in contract.params ? Object.keys(contract.params.shape as object) : [];
    expect([contract.operationId, shape.sort()]).toEqual([contract.operationId, inPath.sort()]);
  }
});
