import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Findings } from '../../src/recording/findings';
import { Staleness } from '../../src/review/staleness';
import { paneStudy, RATE_HZ } from './pane-study';

const FINDINGS: Findings = { edit: 0, phases: [], changes: [], seen: [], warnings: [] };

describe('results older than the last edit', () => {
  beforeEach(() => {
    vi.useFakeTimers();
    vi.stubGlobal('window', globalThis);
  });
  afterEach(() => {
    vi.useRealTimers();
    vi.unstubAllGlobals();
  });

  const edited = () => {
    const study = paneStudy();
    study.stores.analysis.setState({ findings: FINDINGS, edit: 0 });
    const changed = vi.fn();
    const staleness = new Staleness(study.stores, changed);
    study.commands.selectBeat(10 * RATE_HZ * 64, false);
    study.commands.classSelected('V');
    return { study, staleness, changed };
  };

  it('turn grey when they do not catch up, and back when they do', () => {
    const { study, staleness, changed } = edited();
    expect(staleness.stale).toBe(false);
    vi.advanceTimersByTime(250);
    expect(staleness.stale).toBe(true);
    study.stores.analysis.setState({ edit: 1 });
    expect(staleness.stale).toBe(false);
    expect(changed).toHaveBeenCalledTimes(2);
    staleness.stop();
  });

  it('never flicker when they catch up at once', () => {
    const { study, staleness, changed } = edited();
    vi.advanceTimersByTime(90);
    study.stores.analysis.setState({ edit: 1 });
    vi.advanceTimersByTime(500);
    expect(changed).not.toHaveBeenCalled();
    staleness.stop();
  });
});
