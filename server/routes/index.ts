import type { Endpoint } from "@server/http/define-endpoint";
import { systemRoutes } from "./system-routes";

/** To add routes: write `x-routes.ts` exporting an array of endpoints and spread it here. */
const productEndpoints: readonly Endpoint[] = [];

/** Every endpoint of the API; the router, its document, the matrix and the tenancy test read it. */
export const endpoints: readonly Endpoint[] = [
  ...productEndpoints,
  ...systemRoutes(productEndpoints),
];
