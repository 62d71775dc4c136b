import './planted.css';
import { useId, useState } from 'react';
import type {
  PlantedEvidence,
  PlantedHeart,
  PlantedSlow,
  PlantedWave,
} from '../../recording/evidence/planted';
import {
  heightWords,
  rateWords,
  rightWords,
  smallestWords,
  spreadWords,
} from '../../recording/evidence/planted-words';
import { BeatsInTime, WaveInTime, WaveSpectrum } from './planted-pictures';

const minus = (text: string): string => text.replaceAll('-', '−');
const shown = (...args: Parameters<typeof spreadWords>): string => minus(spreadWords(...args));
const nameOf = (wave: PlantedWave): string => `${rateWords(wave.rate)}, ${heightWords(wave.uv)}`;

/** The page of the part `planted`: what was planted in this recording's own noise, and what came back. */
export function PlantedPage({ value }: { readonly value: PlantedEvidence }) {
  const { slow, heart } = value;
  return (
    <>
      <h3>Slow wave</h3>
      {slow.kind === 'planted' ? <SlowPart slow={slow} /> : <p>Not made. {slow.reason}</p>}
      <h3>Heartbeat</h3>
      {heart.kind === 'planted' ? <HeartPart heart={heart} /> : <p>Not made. {heart.reason}</p>}
    </>
  );
}

function aboutSlow(slow: PlantedSlow): string {
  const own =
    slow.ownFrom === 'rhythm'
      ? `Its own wave is ${heightWords(slow.ownUv)} high (median of its epochs)`
      : `It has no rhythm of its own; its highest peaks are ${heightWords(slow.ownUv)} high`;
  const rest =
    slow.restDb === null
      ? 'nothing had to be taken out'
      : `what is left there lies ${minus(slow.restDb.toFixed(1))} dB over its neighbours`;
  return `${own}. Its lines were taken out of the recorded lead and filled with noise at the level beside them (${rest}); then a sine was put in and taken the same way as the figures: same route, same settings, same spoiled stretches. Repeated over ${slow.stretches} stretches of ${Math.round(slow.stretchS / 6) / 10} min: the median, and the least to the greatest of them.`;
}

function SlowPart({ slow }: { readonly slow: PlantedSlow }) {
  const [chosen, setChosen] = useState(0);
  const id = useId();
  const wave = slow.waves[chosen];
  return (
    <>
      <p>{aboutSlow(slow)}</p>
      <p className="planted-smallest">
        <strong>Smallest wave this recording could show</strong> (found in 95 % of {slow.epochs}{' '}
        epochs): {slow.smallest.map(smallestWords).join('; ')}.
      </p>
      <p className="planted-choice">
        <label htmlFor={id}>Wave</label>
        <select id={id} value={chosen} onChange={(event) => setChosen(Number(event.target.value))}>
          {slow.waves.map((one, k) => (
            <option key={nameOf(one)} value={k}>
              {nameOf(one)}
            </option>
          ))}
        </select>
      </p>
      <figure className="planted-figure">
        <figcaption>
          <span className="planted-key wave">planted</span>
          <span className="planted-key drawn">drawn by the study’s route</span>
          {wave.snrDb && wave.scale && wave.delayS
            ? `in all stretches ${shown(wave.snrDb, 1)} dB over the rest, ${shown(wave.scale, 2)} times as high, ${shown(wave.delayS, 2)} s later`
            : 'too little is kept to compare them'}
        </figcaption>
        <WaveInTime wave={wave} />
      </figure>
      <figure className="planted-figure">
        <figcaption>
          <span className="planted-key drawn">leftover with the planted wave</span>
          <span className="planted-key rest">leftover alone</span>
          {`${rightWords(wave)} were given its rhythm`}
        </figcaption>
        <WaveSpectrum wave={wave} slow={slow} />
      </figure>
      <WaveTable waves={slow.waves} />
    </>
  );
}

function WaveTable({ waves }: { readonly waves: readonly PlantedWave[] }) {
  return (
    <table className="data-table">
      <caption>Scores of all planted waves, median (least to most) over the stretches</caption>
      <thead>
        <tr>
          <th scope="col">wave</th>
          <th scope="col">rhythm right</th>
          <th scope="col">DF off, cpm</th>
          <th scope="col">DP off, dB</th>
          <th scope="col">over the rest, dB</th>
          <th scope="col">height</th>
          <th scope="col">later, s</th>
        </tr>
      </thead>
      <tbody>
        {waves.map((wave) => (
          <tr key={nameOf(wave)}>
            <th scope="row">{nameOf(wave)}</th>
            <td>{`${wave.right} of ${wave.epochs}`}</td>
            <td>{shown(wave.dfErrorCpm, 3)}</td>
            <td>{shown(wave.dpErrorDb, 1)}</td>
            <td>{shown(wave.snrDb, 1)}</td>
            <td>{shown(wave.scale, 2)}</td>
            <td>{shown(wave.delayS, 2)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function HeartPart({ heart }: { readonly heart: PlantedHeart }) {
  return (
    <>
      <p>
        {`The average of ${heart.averaged} of its beats (${heightWords(heart.ownUv)} from trough to crest) was taken out of the heart lead at each beat, and put in at other, known times: every ${Math.round(heart.meanRrMs)} ms, RMSSD ${heart.rmssdMs.toFixed(1)} ms. Places within 150 ms of the study’s own beats are left out of the scores. ${heart.stretches} stretches of ${Math.round(heart.stretchS / 6) / 10} min.`}
      </p>
      <figure className="planted-figure">
        <figcaption>
          <span className="planted-key heart">leftover with planted beats, own height</span>
          <span className="planted-key own">left out: the study’s own beats</span>
        </figcaption>
        <BeatsInTime heart={heart} />
      </figure>
      <table className="data-table">
        <caption>Scores of planted beats, median (least to most) over the stretches</caption>
        <thead>
          <tr>
            <th scope="col">height</th>
            <th scope="col">beats scored</th>
            <th scope="col">found, %</th>
            <th scope="col">of those found real, %</th>
            <th scope="col">time, SD, ms</th>
            <th scope="col">RMSSD off, ms</th>
          </tr>
        </thead>
        <tbody>
          {heart.beats.map((beats) => (
            <tr key={beats.share}>
              <th scope="row">{beats.share === 1 ? 'own' : 'a quarter'}</th>
              <td>{beats.planted}</td>
              <td>{shown(beats.sensitivityPct, 1)}</td>
              <td>{shown(beats.predictivityPct, 1)}</td>
              <td>{shown(beats.timingMs, 2)}</td>
              <td>{shown(beats.rmssdErrorMs, 2)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </>
  );
}
