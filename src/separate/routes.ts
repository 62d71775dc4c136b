import type { RouteName } from '../recording/settings';
import { bandRoute } from './band';
import type { Route } from './route';

/** Every route by its name; a new one is a file and a line here. What few recordings take is fetched when one does. */
const ROUTES: Readonly<Record<RouteName, () => Promise<Route>>> = {
  band: async () => bandRoute,
  'beat-average': async () => (await import('./beat-average')).beatAverageRoute,
  fractional: async () => (await import('./fractional')).fractionalRoute,
};

/** Routes that are at hand. */
export type Routes = ReadonlyMap<RouteName, Route>;

/** The routes of these names. */
export async function loadRoutes(names: readonly RouteName[]): Promise<Routes> {
  return new Map(
    await Promise.all(
      [...new Set(names)].map(async (name) => [name, await ROUTES[name]()] as const),
    ),
  );
}

/** The route of a name. Throws where it was not loaded. */
export function routeOf(routes: Routes, name: RouteName): Route {
  const route = routes.get(name);
  if (!route) throw new Error(`route ${name} was not loaded`);
  return route;
}
