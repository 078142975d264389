/** A problem of NIST's Statistical Reference Datasets as read from its file. */
import { readFileSync } from 'node:fs';

export interface NistProblem {
  readonly starts: readonly (readonly number[])[];
  readonly certified: readonly number[];
  readonly deviations: readonly number[];
  readonly residualSum: number;
  readonly x: Float64Array;
  readonly y: Float64Array;
}

export function readNist(name: string): NistProblem {
  const path = new URL(`../../fixtures/nist/${name}.dat`, import.meta.url);
  const lines = readFileSync(path, 'utf8').split(/\r?\n/);
  const rows = lines.flatMap((line) => {
    const found = /^\s*b\d+\s*=\s*(.+)$/.exec(line);
    return found === null ? [] : [(found[1] ?? '').trim().split(/\s+/).map(Number)];
  });
  const start = lines.findIndex((line) => /^Data:\s+y\s+x/.test(line));
  const data = lines
    .slice(start + 1)
    .filter((line) => line.trim() !== '')
    .map((line) => line.trim().split(/\s+/).map(Number));
  const sum = lines.find((line) => line.includes('Residual Sum of Squares')) ?? '';
  return {
    starts: [0, 1].map((column) => rows.map((row) => row[column])),
    certified: rows.map((row) => row[2]),
    deviations: rows.map((row) => row[3]),
    residualSum: Number(sum.split(':')[1]),
    x: Float64Array.from(data, (row) => row[1]),
    y: Float64Array.from(data, (row) => row[0]),
  };
}
