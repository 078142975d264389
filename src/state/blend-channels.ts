/** The channels of the recipe's blend with nothing left out. */
import { type FullChannel, fullChannel } from '../recipe/defaults';
import type { Blend } from '../recipe/schema';

/** Empty where the recipe has no blend. */
export function fullChannelsOf(blend: Blend | undefined): readonly FullChannel[] {
  return (blend?.channels ?? []).map(fullChannel);
}
