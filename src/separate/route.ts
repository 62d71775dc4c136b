import type { HeartOutput, SlowOutput } from '../recording/separated';
import type { RouteName, Settings } from '../recording/settings';
import type { Cpm, Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import type { LeadFacts } from './gaps';
import type { WideLead } from './wide-lead';

/** The slow-wave side of a lead, with what is needed to draw it anew without the file. */
export interface SeparatedSlow extends SlowOutput {
  readonly route: RouteName;
  /** Lead in time of what spectra are computed on, before any shift of the drawn wave; 0 under `band`. */
  readonly derivativeLeadSAt: (frequencyHz: Hertz) => Seconds;
  /** The lead at a rate that shows its heartbeats; null under routes that take none out. */
  readonly wide: WideLead | null;
}

/** What the heartbeats leave in a lead at the slow rate, uV, and how many of its beats are in it. */
export interface HeartPart {
  readonly uv: Float64Array;
  readonly beats: number;
}

/** What a route is asked to make of one lead. */
export interface RouteJob {
  readonly lead: string;
  readonly rateHz: Hertz;
  readonly sampleCount: number;
  readonly settings: Settings;
  readonly slow: boolean;
  readonly heart: boolean;
}

/** A lead without holes runs in, the outputs asked for come out. */
export interface RouteRun {
  push(block: Float64Array): void;
  /** `recorded` is the anti-aliased 4 Hz lead, NaN in gaps. */
  finish(recorded: Float64Array, facts: LeadFacts): RouteOutputs;
}

export interface RouteOutputs {
  readonly slow: SeparatedSlow | null;
  readonly heart: HeartOutput | null;
}

/** What a slow wave is drawn with, beside the settings. */
export interface Drawing {
  /** The lead's usual rhythm: its lead in time under a derivative is undone there. */
  readonly dfCpm: Cpm;
  /** 0 where a sample at the slow rate is missing or spoiled, else 1. */
  readonly kept: Uint8Array;
  /** A reference for breathing at the slow rate, NaN where there is none; null where none is used. */
  readonly breathing: Float64Array | null;
  /** What the heartbeats leave in the lead, to be taken out under route `beat-average`; null where it is not known. */
  readonly heartPart: HeartPart | null;
}

/** One way of parting slow wave and heartbeat. */
export interface Route {
  start(job: RouteJob): RouteRun;
  /**
   * Draws the slow wave again from what is in memory, for other settings of the same route or another drawing; with a rest
   * now and then.
   */
  redraw(slow: SeparatedSlow, settings: Settings, drawing: Drawing): Generator<void, SeparatedSlow>;
}
