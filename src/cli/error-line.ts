/** An error as the command line tells it: `rimlight: WHAT (WHERE). WHAT TO DO`. */
import { errorSentence, type RimlightError } from '../errors';

export function errorLine(error: RimlightError): string {
  return `rimlight: ${errorSentence(error)}`;
}
