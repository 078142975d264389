/** What the element type of a file says of its counts: the same for every slab, whatever a slab's own numbers are. */
import type { ElementType } from '../src/io/container';
import type { SlabContext } from '../src/science/bands/slab-data';

type ElementContext = Pick<SlabContext, 'bytesPerChannel' | 'isUnsigned' | 'mostCounts'>;

const unsigned = (bytesPerChannel: number, mostCounts: number): ElementContext => ({
  bytesPerChannel,
  isUnsigned: true,
  mostCounts,
});
const signed = (bytesPerChannel: number): ElementContext => ({
  bytesPerChannel,
  isUnsigned: false,
  mostCounts: Number.POSITIVE_INFINITY,
});

/** 64-bit integers are held in the smallest type their numbers fit, one byte at least. */
export const elementContexts: Readonly<Record<ElementType, ElementContext>> = {
  bool: unsigned(1, 1),
  uint8: unsigned(1, 0xff),
  uint16: unsigned(2, 0xffff),
  uint32: unsigned(4, 0xffffffff),
  uint64: unsigned(1, Number.POSITIVE_INFINITY),
  int8: signed(1),
  int16: signed(2),
  int32: signed(4),
  int64: signed(1),
  float16: signed(4),
  float32: signed(4),
  float64: signed(8),
};
