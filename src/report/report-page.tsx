import type { ReactNode } from 'react';
import type { ReportModel } from '../export/report-model';
import { FirstSheet } from './first-sheet';
import type { ReportPictures } from './report-pictures';
import { SecondSheet } from './second-sheet';
import { ThirdSheet } from './third-sheet';

/**
 * The report as it is printed, sheet after sheet; light, and readable without colour. A sheet begins on a new page and goes
 * on to the next where its words want more room.
 */
export function ReportPage({
  model,
  pictures,
}: {
  readonly model: ReportModel;
  readonly pictures: ReportPictures | null;
}) {
  const draft = model.kind === 'draft';
  return (
    <article className="report-page" aria-label="Report">
      {draft && <Watermark kind="on-paper" />}
      <Sheet draft={draft}>
        <FirstSheet model={model} pictures={pictures} />
      </Sheet>
      <Sheet draft={draft}>
        <SecondSheet model={model} />
      </Sheet>
      <Sheet draft={draft} dense>
        <ThirdSheet model={model} />
      </Sheet>
    </article>
  );
}

function Sheet({
  draft,
  dense = false,
  children,
}: {
  readonly draft: boolean;
  readonly dense?: boolean;
  readonly children: ReactNode;
}) {
  return (
    <div className={dense ? 'report-sheet report-dense' : 'report-sheet'}>
      {children}
      {draft && <Watermark kind="on-screen" />}
    </div>
  );
}

/**
 * DRAFT across the sheet, written by report.css since it says again what the status says. On paper one mark repeats on every
 * page, however many a sheet takes; on screen each sheet has its own.
 */
function Watermark({ kind }: { readonly kind: 'on-paper' | 'on-screen' }) {
  return <div className={`report-watermark ${kind}`} aria-hidden="true" />;
}
