import { buildingRoutes } from "./building-routes";
import { loopRoutes } from "./loop-routes";
import { pointRoutes } from "./point-routes";
import { siteRoutes } from "./site-routes";

/** Sites, buildings, loops, metering points and the pipe tables they are described with. */
export const placesRoutes = [...siteRoutes, ...buildingRoutes, ...loopRoutes, ...pointRoutes];
