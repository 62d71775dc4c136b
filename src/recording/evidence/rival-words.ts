import type { Rivals } from './together';
import { depthPercent, pWords, VERDICT_WORDS } from './together-words';

/** What each rival explanation comes to, with what it was judged by. */
export function rivalRows({ breathing, waves, leak }: Rivals): readonly {
  readonly name: string;
  readonly verdict: string;
  readonly words: string;
}[] {
  return [
    {
      name: 'Breathing',
      verdict: VERDICT_WORDS[breathing.verdict],
      words: breathingWords(breathing),
    },
    { name: '0.1 Hz waves', verdict: VERDICT_WORDS[waves.verdict], words: wavesWords(waves) },
    {
      name: 'Leakage of the heartbeat',
      verdict: VERDICT_WORDS[leak.verdict],
      words: leakWords(leak),
    },
  ];
}

function breathingWords({ coherence, level, perMin, multiple }: Rivals['breathing']): string {
  const shared =
    coherence === null || level === null
      ? 'coherence of RR and breathing at DF could not be computed'
      : `RR and breathing at DF: coherence ${coherence.toFixed(2)}, noise under ${level.toFixed(2)}`;
  if (perMin === null) return `${shared}; breathing rate not known`;
  const near = multiple === null ? 'near no whole multiple of DF' : `near ${multiple} times DF`;
  return `${shared}; breathing ${perMin.toFixed(1)} a minute, ${near}`;
}

function wavesWords({ powerRatio, secondDepthPct }: Rivals['waves']): string {
  const ratio =
    powerRatio === null
      ? 'power of RR at twice DF could not be computed'
      : `RR has ${powerRatio.toFixed(powerRatio < 10 ? 1 : 0)} times as much power about twice DF as about DF`;
  return `${ratio}; it goes ±${depthPercent(secondDepthPct)} twice a cycle`;
}

function leakWords({ leakUv, slowUv, withoutDepthPct, withoutP, heightP }: Rivals['leak']): string {
  const share =
    leakUv === null
      ? 'what the beats put into the lead could not be measured'
      : `the beats put about ${leakUv.toFixed(leakUv < 10 ? 1 : 0)} µV of ${slowUv.toFixed(0)} µV into the lead near DF`;
  const without =
    withoutDepthPct === null || withoutP === null
      ? ''
      : `; with that taken out RR ±${depthPercent(withoutDepthPct)} (p ${pWords(withoutP)})`;
  const heights = heightP === null ? '' : `; R height with the same phase p ${pWords(heightP)}`;
  return share + without + heights;
}
