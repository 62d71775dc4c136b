import type { HeartOutput } from '../../src/recording/separated';
import type { HeartRouteName, Settings } from '../../src/recording/settings';
import type { SeparatedSlow } from '../../src/separate/route';
import { createSeparation } from '../../src/separate/separation';
import { ALL_ROUTES } from '../separate/all-routes';
import { RATE_HZ } from './invented-study';

/** Samples given at once, as the worker does. */
const PIECE = 16384;

/** One lead at 1 kHz parted into both outputs by the code the worker runs. */
export function separate(
  samples: Float64Array,
  route: HeartRouteName,
  settings: Settings,
): { readonly slow: SeparatedSlow; readonly heart: HeartOutput } {
  const separation = createSeparation({
    lead: '1',
    rateHz: RATE_HZ,
    sampleCount: samples.length,
    settings: { ...settings, slowRoute: route, heartRoute: route },
    routes: ALL_ROUTES,
    wants: { slow: true, heart: true },
  });
  for (let from = 0; from < samples.length; from += PIECE)
    separation.push(samples.subarray(from, from + PIECE));
  const { slow, heart } = separation.finish();
  if (!slow || !heart) throw new Error('both outputs were wanted');
  return { slow, heart };
}
