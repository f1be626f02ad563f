import type { Test } from "supertest";
import type { Endpoint } from "@server/http/define-endpoint";
import { signedIn, type Agent } from "@server/testing/factories";
import { ownedIds } from "@server/testing/owned-ids";
import { sampleInputs } from "@server/testing/sample-inputs";
import { testApp } from "@server/testing/test-app";
import { endpoints } from ".";

const app = testApp();

const withIds = endpoints.filter(({ contract }) => contract.path.includes(":"));

function addressOf({ contract }: Endpoint, ids: Readonly<Record<string, string>>): string {
  const path = contract.path.replace(/:(\w+)/g, (_, name: string) => {
    const id = ids[name];
    if (id === undefined) throw new Error(`make one for :${name} in server/testing/owned-ids.ts`);
    return id;
  });
  const query = new URLSearchParams(sampleInputs[contract.operationId]?.query).toString();
  return query === "" ? path : `${path}?${query}`;
}

type Ids = Readonly<Record<string, string>>;

function filledIn(body: object | undefined, ids: Ids): object {
  const text = JSON.stringify(body ?? {});
  return JSON.parse(
    text.replace(/":(\w+)"/g, (_, name: string) => JSON.stringify(ids[name])),
  ) as object;
}

function call(agent: Agent, endpoint: Endpoint, address: string, ids: Ids): Test {
  const { method, operationId } = endpoint.contract;
  const { body, file } = sampleInputs[operationId] ?? {};
  if (method === "get" || method === "delete") return agent[method](address);
  const request = agent[method](address, file === undefined ? filledIn(body, ids) : undefined);
  return file === undefined ? request : request.attach("file", Buffer.from(file), "log.csv");
}

it.each(withIds.map((endpoint) => [endpoint.contract.operationId, endpoint] as const))(
  "%s finds nothing of another organisation, and its owner's own",
  async (_, endpoint) => {
    const owner = await signedIn(app, { role: "administrator" });
    const stranger = await signedIn(app, { role: "administrator" });
    const ids = await ownedIds(app, owner);
    const address = addressOf(endpoint, ids);
    const foreign = await call(stranger, endpoint, address, ids);
    expect([foreign.status, foreign.body.code]).toEqual([404, "not-found"]);
    // Were the input wrong, the answer above would prove nothing. A state may forbid it (409).
    const own = await call(owner, endpoint, address, ids);
    expect([200, 201, 202, 409]).toContain(own.status);
  },
);
