/// <reference path="./raw-css.d.ts" />
import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import type { ReportModel } from '../export/report-model';
import { cssString, shortFoot } from './foot-text';
import styles from './report.css?raw';
import { ReportPage } from './report-page';
import type { ReportPictures } from './report-pictures';

/** Nothing is fetched and nothing runs: styles and pictures lie in the file. */
const POLICY =
  "default-src 'none'; style-src 'unsafe-inline'; img-src data:; base-uri 'none'; form-action 'none'";

const OWN_STYLES = `
body { margin: 0; background: #e7e5df; font-family: system-ui, sans-serif; }
@media print { body { background: none; } }
`;

/**
 * report.html: the printed page as one file that holds all it needs, with a Content-Security-Policy of its own that lets
 * nothing in or out. Nothing identifying stands in its title.
 */
export function reportHtml(model: ReportModel, pictures: ReportPictures | null): string {
  const page = renderToStaticMarkup(createElement(ReportPage, { model, pictures }));
  const foot = `:root { --report-foot: ${cssString(shortFoot(model.foot))}; }`.replaceAll(
    '<',
    '\\3c ',
  );
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${POLICY}">
<meta name="viewport" content="width=device-width">
<meta name="color-scheme" content="light">
<title>Report: gastric rhythm and heart-rate variability</title>
<style>${styles}${OWN_STYLES}${foot}</style>
</head>
<body>
${page}
</body>
</html>
`;
}
