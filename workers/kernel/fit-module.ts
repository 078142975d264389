/** The compiled kernel of the fit as bytes: made from `assembly/` while the program is built, part of the program itself. */
import { encodedKernel } from './assembly/shapes?compiled';

export function fitModuleBytes(): Uint8Array<ArrayBuffer> {
  return Uint8Array.from(atob(encodedKernel), (character) => character.charCodeAt(0));
}
