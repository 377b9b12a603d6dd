import { fileURLToPath } from 'node:url';
import type { Result } from '@heddle/shared';
import PDFDocument from 'pdfkit';
import { acquisitionRows, CAUTIONS, leftOutRows, lookFor } from './brief-words.js';
import { ppmTicks, spectrumPath, type Frame } from './spectrum-path.js';

const FONTS = fileURLToPath(new URL('../../../../fonts/plex-sans/', import.meta.url));
const INK = '#1b1f2a';
const SOFT = '#575449';
const INDIGO = '#27357a';
const MADDER = '#a8322a';
const MARGIN = 48;
/** Most groups of lines that are listed. */
const MOST_GROUPS = 12;

/** What a brief is made of besides the result. */
export interface BriefFacts {
  revision: number;
  author: string;
  date: Date;
}

/** The brief for the spectrometer: one or two A4 pages, the spectrum as vector graphics. */
export function makeBrief(result: Result, facts: BriefFacts): Promise<Buffer> {
  const title = `${result.system.name}: brief`;
  const pdf = new PDFDocument({
    size: 'A4',
    margin: MARGIN,
    info: { Title: title, Author: facts.author, Creator: 'Heddle' },
  });
  const chunks: Buffer[] = [];
  const whole = new Promise<Buffer>((resolve, reject) => {
    pdf.on('data', (chunk: Buffer) => chunks.push(chunk));
    pdf.on('end', () => resolve(Buffer.concat(chunks)));
    pdf.on('error', reject);
  });
  pdf.registerFont('text', `${FONTS}IBMPlexSans-Regular.woff`);
  pdf.registerFont('bold', `${FONTS}IBMPlexSans-SemiBold.woff`);
  drawHead(pdf, result, facts);
  drawSpectrum(pdf, result);
  drawTable(pdf, 'Acquisition', acquisitionRows(result));
  if (result.lines) drawList(pdf, 'What to look for', lookFor(result.lines).slice(0, MOST_GROUPS));
  drawLeftOut(pdf, result);
  drawList(pdf, 'Cautions', CAUTIONS);
  pdf.end();
  return whole;
}

function drawHead(pdf: PDFKit.PDFDocument, { system, report }: Result, { revision, author, date }: BriefFacts): void {
  pdf.font('bold').fontSize(17).fillColor(INK).text(system.name);
  const day = date.toISOString().slice(0, 10);
  pdf.font('text').fontSize(9).fillColor(SOFT);
  pdf.text(`Predicted, not measured. Revision ${revision}, ${author}, ${day}, engine ${report.engine}.`);
  pdf.moveDown(0.6);
}

function drawSpectrum(pdf: PDFKit.PDFDocument, { spectrum }: Result): void {
  const frame: Frame = { left: MARGIN, top: pdf.y, width: pdf.page.width - 2 * MARGIN, height: 190 };
  const base = frame.top + frame.height + 4;
  pdf
    .path(spectrumPath(spectrum, frame, 1200))
    .lineWidth(0.6)
    .lineJoin('round')
    .stroke(INDIGO);
  pdf
    .moveTo(frame.left, base)
    .lineTo(frame.left + frame.width, base)
    .lineWidth(0.5)
    .stroke(INK);
  pdf.font('text').fontSize(8).fillColor(INK);
  for (const ppm of ppmTicks(spectrum, 9)) {
    const x = frame.left + (frame.width * (spectrum.firstPpm - ppm)) / (spectrum.firstPpm - spectrum.lastPpm);
    pdf
      .moveTo(x, base)
      .lineTo(x, base + 3)
      .stroke(INK);
    pdf.text(String(ppm), x - 20, base + 5, { width: 40, align: 'center' });
  }
  pdf.fillColor(SOFT).text('ppm', frame.left, base + 15, { width: frame.width, align: 'right' });
  pdf.x = MARGIN;
  pdf.y = base + 28;
}

function heading(pdf: PDFKit.PDFDocument, words: string): void {
  if (pdf.y > pdf.page.height - MARGIN - 70) pdf.addPage();
  pdf.moveDown(0.5).font('bold').fontSize(11).fillColor(INK).text(words, MARGIN).moveDown(0.2);
  pdf.font('text').fontSize(9);
}

function drawTable(pdf: PDFKit.PDFDocument, title: string, rows: readonly [string, string][]): void {
  heading(pdf, title);
  for (const [name, value] of rows) {
    const { y } = pdf;
    pdf.fillColor(SOFT).text(name, MARGIN, y, { width: 110 });
    pdf.fillColor(INK).text(value, MARGIN + 120, y, { width: pdf.page.width - 2 * MARGIN - 120 });
  }
  pdf.x = MARGIN;
}

function drawList(pdf: PDFKit.PDFDocument, title: string, rows: readonly string[]): void {
  if (rows.length === 0) return;
  heading(pdf, title);
  pdf.fillColor(INK);
  for (const row of rows) pdf.text(row, MARGIN, pdf.y, { width: pdf.page.width - 2 * MARGIN });
}

function drawLeftOut(pdf: PDFKit.PDFDocument, { report }: Result): void {
  const rows = leftOutRows(report.approximations);
  heading(pdf, 'What this run leaves out');
  if (rows.length + report.warnings.length === 0) pdf.fillColor(INK).text('Nothing of any size.');
  for (const warning of report.warnings) pdf.fillColor(MADDER).text(warning);
  for (const { text, doubtful } of rows) pdf.fillColor(doubtful ? MADDER : INK).text(text);
}
