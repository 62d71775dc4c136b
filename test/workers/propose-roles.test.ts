import { describe, expect, it } from 'vitest';
import type { Channel } from '../../src/recording/channel';
import {
  heartCandidates,
  labelHint,
  proposeRoles,
  slowCandidates,
} from '../../workers/propose-roles';

const channel = (index: number, label: string, rateHz = 250, unit = 'uV'): Channel => ({
  index,
  label,
  rateHz,
  sampleCount: rateHz * 600,
  unit:
    unit === 'uV'
      ? { kind: 'voltage', text: unit, microvoltsPerUnit: 1 }
      : { kind: 'unknown', text: unit },
  stepUv: 0.1,
  railsUv: null,
  transducer: '',
  prefilter: { kind: 'unknown', text: '' },
});

describe('proposed roles', () => {
  const channels = [
    channel(0, 'EGG 1'),
    channel(1, 'EGG 2'),
    channel(2, 'ECG'),
    channel(3, 'Resp belt', 25, 'a.u.'),
  ];

  it('the reported lead is the best by quality, the heart lead the clearest heartbeat', () => {
    const { roles, reasons } = proposeRoles(
      channels,
      [
        { channel: 0, quality: 0.6, heightUv: 80, snrDb: 12 },
        { channel: 2, quality: 0.9, heightUv: 600, snrDb: 25 },
      ],
      [
        { quality: 0.5, reason: 'restless' },
        { quality: 0.8, reason: 'quiet' },
      ],
    );
    expect(roles.slow.map((lead) => lead.kind === 'channel' && lead.channel)).toEqual([0, 1]);
    expect(roles.reported).toBe(1);
    expect(roles.heart).toEqual({ kind: 'channel', channel: 2 });
    expect(roles.breath).toEqual({ kind: 'channel', channel: 3 });
    expect(reasons.heart).toContain('600');
  });

  it('a measure belongs to the lead it was taken of, whatever leads were measured', () => {
    const { roles, reasons } = proposeRoles(
      channels,
      [],
      [
        { quality: 0.9, reason: 'of the heart lead' },
        { quality: 0.4, reason: 'of EGG 2' },
      ],
      {
        leads: [
          { kind: 'channel', channel: 2 },
          { kind: 'channel', channel: 1 },
        ],
        over: 'fasting',
      },
    );
    expect(roles.reported).toBe(1);
    expect(reasons.slow[0]).toMatch(/not measured$/);
    expect(reasons.slow[1]).toMatch(/of EGG 2$/);
  });

  it('the reason names what was measured: the fasting phase, or the whole study', () => {
    const reported = (over: 'fasting' | 'whole' | null) =>
      proposeRoles(channels, [], [], { leads: [], over }).reasons.reported;
    expect(reported('fasting')).toMatch(/^best quality of 2 leads in the fasting phase,/);
    expect(reported('whole')).toMatch(/over the whole study, no fasting phase being known,/);
    expect(reported(null)).not.toMatch(/fasting|whole/);
  });

  it('a recording sampled below 50 Hz gets no heart lead, and is told why', () => {
    const slow = [channel(0, 'EGG', 4)];
    expect(heartCandidates(slow)).toEqual([]);
    const { roles, reasons } = proposeRoles(slow, [], [{ quality: 1, reason: 'quiet' }]);
    expect(roles.heart).toBeNull();
    expect(reasons.heart).toContain('no heartbeat can be read');
  });

  it('unlabelled channels serve the stomach; a channel of unknown unit does not', () => {
    const some = [channel(0, 'ch 1'), channel(1, 'ch 2', 250, 'bogus')];
    expect(slowCandidates(some).map((one) => one.index)).toEqual([0]);
  });

  it('labels are read as hints only', () => {
    expect(labelHint('EGG antrum')).toBe('stomach');
    expect(labelHint('Status')).toBe('other');
    expect(labelHint('AF3')).toBe('none');
  });
});
