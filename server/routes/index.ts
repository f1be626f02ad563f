import type { Endpoint } from "@server/http/define-endpoint";
import { accessTokenRoutes } from "./access-token-routes";
import { accountRoutes } from "./account-routes";
import { companionRoutes } from "./companion-routes";
import { correctionRoutes } from "./correction-routes";
import { developmentRoutes } from "./development-routes";
import { energyRoutes } from "./energy-routes";
import { evidenceRoutes } from "./evidence-routes";
import { fillRoutes } from "./fill-routes";
import { importBatchRoutes } from "./import-batch-routes";
import { importResultRoutes } from "./import-result-routes";
import { importRoutes } from "./import-routes";
import { memberRoutes } from "./member-routes";
import { meterComparisonRoutes } from "./meter-comparison-routes";
import { placesRoutes } from "./places-routes";
import { recipeRoutes } from "./recipe-routes";
import { sessionRoutes } from "./session-routes";
import { shapeRoutes } from "./shape-routes";
import { systemRoutes } from "./system-routes";
import { todayRoutes } from "./today-routes";
import { workingsRoutes } from "./workings-routes";

/** To add routes: write `x-routes.ts` exporting an array of endpoints and spread it here. */
const productEndpoints: readonly Endpoint[] = [
  ...sessionRoutes,
  ...accountRoutes,
  ...memberRoutes,
  ...accessTokenRoutes,
  ...developmentRoutes,
  ...placesRoutes,
  ...importRoutes,
  ...importResultRoutes,
  ...recipeRoutes,
  ...importBatchRoutes,
  ...evidenceRoutes,
  ...energyRoutes,
  ...companionRoutes,
  ...correctionRoutes,
  ...fillRoutes,
  ...meterComparisonRoutes,
  ...shapeRoutes,
  ...todayRoutes,
  ...workingsRoutes,
];

/** Every endpoint of the API; the router, its document, the matrix and the tenancy test read it. */
export const endpoints: readonly Endpoint[] = [
  ...productEndpoints,
  ...systemRoutes(productEndpoints),
];
