import { accountsRoutes } from './accounts/accounts-routes';
import type { AppContext } from './app-context';
import type { RouteDefinition } from './http/route';
import { serviceRoutes } from './http/service-routes';
import type { JobDefinition } from './jobs/job';
import { sitesRoutes } from './settings/sites-routes';

/** Every endpoint of the product: a feature adds its own here. */
export function featureRoutes(context: AppContext): RouteDefinition[] {
  const routes: RouteDefinition[] = [
    ...serviceRoutes(() => routes),
    ...accountsRoutes(context),
    ...sitesRoutes,
  ];
  return routes;
}

/** Every job of the product. */
export const featureJobs: readonly JobDefinition[] = [];
