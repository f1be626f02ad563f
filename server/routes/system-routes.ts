import { QueryTypes } from "sequelize";
import { getHealth, getOpenApi } from "@shared/contracts/system";
import { instantText } from "@server/database/conversions";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { openApiDocument } from "@server/http/openapi";
import { everyone } from "@server/policies/policy";
import { version } from "@server/version";

/** Health, and the API's own document made of every endpoint, these two among them. */
export function systemRoutes(others: readonly Endpoint[]): Endpoint[] {
  const routes: Endpoint[] = [
    defineEndpoint(getHealth, {
      policy: everyone,
      async handle({ database, clock }) {
        await database.query("SELECT 1", { type: QueryTypes.SELECT });
        return { status: "ok" as const, version, now: instantText(clock.date()) };
      },
    }),
    defineEndpoint(getOpenApi, {
      policy: everyone,
      async handle() {
        document ??= openApiDocument([...others, ...routes]);
        return document;
      },
    }),
  ];
  // Making it takes some 10 ms and it never changes while the process lives.
  let document: Record<string, unknown> | undefined;
  return routes;
}
