import type { SettingsMap } from '../src/recording/settings-map';
import type { MapWork } from './pipeline-map-organ';
import { heartMap } from './pipeline-settings-heart';
import { slowMap } from './pipeline-settings-slow';

/** The maps of a review: which settings of the routes would have done best on a stretch of it. */
export async function settingsMap(work: MapWork): Promise<SettingsMap> {
  const slow = await slowMap(work);
  const heart = await heartMap(work);
  return { edit: work.from.inputs.edit, slow, heart };
}
