import type { RouteName } from '../recording/settings';
import { bandRoute } from './band';
import { fractionalRoute } from './fractional';
import type { Route } from './route';

/** Every route by its name; a new one is a file and a line here. */
export const ROUTES: Readonly<Record<RouteName, Route>> = {
  band: bandRoute,
  fractional: fractionalRoute,
};
