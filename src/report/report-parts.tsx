import type { ReactNode } from 'react';
import type { Fact } from '../export/report-identity';
import type { Note } from '../export/report-notes';
import type { ReportPicture } from './report-pictures';

/** Names and what is said of them, as many beside each other as there is room for. */
export function Facts({
  facts,
  inLine,
}: {
  readonly facts: readonly Fact[];
  readonly inLine?: boolean;
}) {
  return (
    <dl className={inLine ? 'report-facts-in-line' : 'report-facts'}>
      {facts.map(({ name, words }) => (
        <div key={name + words}>
          <dt>{name}</dt>
          <dd>{words}</dd>
        </div>
      ))}
    </dl>
  );
}

export function Part({
  title,
  children,
}: {
  readonly title: string;
  readonly children: ReactNode;
}) {
  return (
    <section className="report-part">
      <h2>{title}</h2>
      {children}
    </section>
  );
}

/** A picture with the words that stand under it; those who do not see it hear `picture.words`. */
export function Picture({
  picture,
  caption,
}: {
  readonly picture: ReportPicture;
  readonly caption: string;
}) {
  const source = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(picture.svg)}`;
  return (
    <figure className="report-figure">
      <figcaption>{caption}</figcaption>
      <img src={source} alt={picture.words} />
    </figure>
  );
}

/** The letters of notes beside a figure. */
export function Letters({ letters }: { readonly letters: readonly string[] }) {
  return letters.length > 0 ? <sup>{letters.join(' ')}</sup> : null;
}

/** The small print that letters in a table point to. */
export function Notes({
  notes,
  children,
}: {
  readonly notes: readonly Note[];
  readonly children?: ReactNode;
}) {
  if (notes.length === 0 && !children) return null;
  return (
    <div className="report-notes">
      {children}
      <dl>
        {notes.map(({ letter, text }) => (
          <div key={letter}>
            <dt>{letter}</dt>
            <dd>{text}</dd>
          </div>
        ))}
      </dl>
    </div>
  );
}
