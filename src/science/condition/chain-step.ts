/** The steps a chain is made of, as plain data: files read, units converted, defaults filled in. */
import type { Medium } from '../axis';
import type { BaselineOptions } from './baseline';
import type { BinOptions } from './bin';
import type { CropOptions } from './crop';
import type { WantedRank } from './denoise';
import type { DespikeOptions } from './despike';
import type { RecordedReference } from './reference-recording';
import type { ResponseCurve } from './response';

type Window = readonly [number, number];

export type ActiveStep = { readonly isOff: false } & (
  | ({ readonly step: 'despike'; readonly method: 'spectral' | 'neighbour' } & DespikeOptions)
  | { readonly step: 'offset'; readonly dark: number | RecordedReference }
  | { readonly step: 'response'; readonly curve: ResponseCurve }
  | {
      readonly step: 'calibrate';
      readonly points: readonly (readonly [number, number])[];
      readonly degree: number;
      readonly unit: 'nm' | 'cm-1';
      /** of points in nm */
      readonly medium: Medium;
    }
  | {
      readonly step: 'farfield';
      readonly outside: RecordedReference;
      readonly scale: number | 'fit' | 'fit-pixels';
      /** eV; null where nothing is fitted */
      readonly window: Window | null;
    }
  | ({ readonly step: 'baseline' } & BaselineOptions)
  | { readonly step: 'denoise'; readonly rank: WantedRank }
  | { readonly step: 'align-rows'; readonly maxShiftPx: number }
  | ({ readonly step: 'crop' } & CropOptions)
  | ({ readonly step: 'bin' } & BinOptions)
);

/** Kept in the recipe and skipped: nothing of it is looked at. */
export interface SkippedStep {
  readonly isOff: true;
  readonly step: ActiveStep['step'];
}

export type ChainStep = ActiveStep | SkippedStep;

/** One kind of step. */
export type StepOf<Name extends ActiveStep['step']> = Extract<ActiveStep, { readonly step: Name }>;
