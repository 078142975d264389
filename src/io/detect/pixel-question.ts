/** What is asked about pixel pitch, and what is answered. */
import type { PositionAxis } from '../../science/scan';
import type { ScanChoices } from '../scan-choices';
import type { Guess } from '../scan-plan';
import type { RoledVector } from './agreement';
import type { Saying } from './sayings';

export interface FoundPixel {
  readonly x: PositionAxis;
  readonly y: PositionAxis;
  readonly guess: Guess;
  readonly warnings: readonly string[];
  /** for the resolved scan block; undefined where the file says it better than the block can */
  readonly choice: ScanChoices['pixel'];
}

export interface PixelQuestion {
  readonly nx: number;
  readonly ny: number;
  readonly stated: ScanChoices['pixel'];
  readonly vectors: readonly RoledVector[];
  /** what the file calls the cube's x and y axes; null when it does not say */
  readonly xName: string | null;
  readonly yName: string | null;
  readonly sayings: readonly Saying[];
  /** path of the cube and its folder, whose attributes count first */
  readonly cubePath: string;
}
