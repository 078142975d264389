/** What `inspect` prints for people. */
import type { Guess, Inspection } from '../io/scan-plan';
import { formatCount, formatEnergy, formatLength, formatSignificant } from '../science/format';
import type { PositionAxis, ScanMeta } from '../science/scan';
import { nmFromEv } from '../science/units';
import type { CountStatistics } from './count-statistics';

export function inspectionText(inspection: Inspection, statistics: CountStatistics | null): string {
  const { fileName, format, plan, guesses, warnings, problems } = inspection;
  return [
    `${fileName} (${format})`,
    ...section('Scan', plan === null ? [] : scanLines(plan.meta)),
    ...section('Read as', guesses.flatMap(guessLines)),
    ...section('Counts', statistics === null ? [] : countLines(statistics, plan?.meta ?? null)),
    ...section('Warnings', warnings),
    ...section(
      'In the way',
      problems.map(({ what, hint }) => `${what}. ${hint}`),
    ),
  ].join('\n');
}

function section(title: string, lines: readonly string[]): readonly string[] {
  return lines.length === 0 ? [] : ['', title, ...lines.map((line) => `  ${line}`)];
}

const labelWidth = 12;

function row(label: string, text: string): string {
  return label.padEnd(labelWidth) + text;
}

function scanLines({ shape, axis, x, y, laserEv, exposureS }: ScanMeta): readonly string[] {
  const fromEv = axis.centresEv[0];
  const toEv = axis.centresEv[axis.centresEv.length - 1];
  const [fromNm, toNm] = [nmFromEv(toEv), nmFromEv(fromEv)].map((nm) => nm.toFixed(2));
  return [
    row('pixels', `${shape.nx} columns × ${shape.ny} rows`),
    row(
      'channels',
      `${shape.nk}, ${formatEnergy(fromEv)} to ${formatEnergy(toEv)} (${fromNm} to ${toNm} nm in vacuum)`,
    ),
    row('columns', positionText(x)),
    row('rows', positionText(y)),
    ...(laserEv === null
      ? []
      : [row('laser', `${formatEnergy(laserEv)} (${nmFromEv(laserEv).toFixed(2)} nm in vacuum)`)]),
    ...(exposureS === null ? [] : [row('exposure', `${exposureS} s`)]),
  ];
}

function positionText({ label, unit, isLength, pitch, values }: PositionAxis): string {
  if (unit === 'px') return 'step not known';
  const step = isLength ? formatLength(pitch) : `${formatSignificant(pitch, 4)} ${unit}`;
  const span = values === null ? '' : `, ${values[0]} to ${values[values.length - 1]} ${unit}`;
  return label === 'x' || label === 'y' ? `step ${step}` : `${label}: step ${step}${span}`;
}

/** Where a thing was found, then why; the evidence of what is stated says that by itself. */
function evidenceText(source: Guess['source'], evidence: string): string {
  return source === 'stated' ? evidence : `${sourceWords[source]}: ${evidence}`;
}

const sourceWords: Readonly<Record<Exclude<Guess['source'], 'stated'>, string>> = {
  file: 'from the file',
  guess: 'guessed',
  missing: 'MISSING',
  absent: 'none',
};

function guessLines({ field, label, source, evidence, alternatives }: Guess): readonly string[] {
  return [
    row(field, label),
    row('', evidenceText(source, evidence)),
    ...alternatives.map((other) => row('', `or ${other.label}: ${other.evidence}`)),
  ];
}

function countLines(statistics: CountStatistics, meta: ScanMeta | null): readonly string[] {
  const { step, pixels, totals, lowest, highest, noDataValues, brightestEv } = statistics;
  const unit = meta === null || meta.quantity === 'counts' ? '' : ` (${meta.quantity})`;
  return [
    ...(step === 1
      ? []
      : [row('looked at', `${pixels} pixels, one in every ${step} rows and columns`)]),
    ...(lowest === null || highest === null
      ? []
      : [row('per channel', `${shown(lowest)} to ${shown(highest)}${unit}`)]),
    row(
      'per pixel',
      `median ${formatCount(totals.median)}, quartiles ${formatCount(totals.lowerQuartile)} and ${formatCount(totals.upperQuartile)}, from ${formatCount(totals.lowest)} to ${formatCount(totals.highest)}`,
    ),
    ...(brightestEv === null
      ? []
      : [row('brightest', `${formatEnergy(brightestEv)}, in the mean spectrum`)]),
    ...(noDataValues === null || noDataValues === 0
      ? []
      : [row('no data', `${noDataValues} values`)]),
  ];
}

function shown(value: number): string {
  return Number.isInteger(value) ? String(value) : formatSignificant(value, 4);
}
