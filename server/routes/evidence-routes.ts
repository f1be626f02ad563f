import type { Endpoint } from "@server/http/define-endpoint";
import { bathCheckRoutes } from "./bath-check-routes";
import { installationRoutes } from "./installation-routes";
import { instrumentRoutes } from "./instrument-routes";

/** What stands behind a point's figures. */
export const evidenceRoutes: readonly Endpoint[] = [
  ...instrumentRoutes,
  ...bathCheckRoutes,
  ...installationRoutes,
];
