import { useMemo } from 'react';
import { type Hide, identityHider, nothingHidden } from '../export/report-hiding';
import { useAnalysis, useSession, useView } from './app-context';

/** Takes who it is out of texts while identity is hidden; leaves them as they are otherwise. */
export function useHide(): Hide {
  const hidden = useView((state) => state.identityHidden);
  const recording = useAnalysis((state) => state.recording);
  const study = useSession((state) => state.session?.state.study);
  return useMemo(
    () => (hidden && recording && study ? identityHider(recording, study) : nothingHidden),
    [hidden, recording, study],
  );
}
