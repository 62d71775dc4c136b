import { loadRoutes } from '../../src/separate/routes';

/** Every route, for tests that choose one by its name. */
export const ALL_ROUTES = await loadRoutes(['band', 'beat-average', 'fractional']);
