/** Files on disk as the engine wants them. */
import type { ScanInputs } from '../../workers/engine';
import type { FoundFile } from './recipe-file';

export function scanInputs(scan: FoundFile, companions: readonly FoundFile[]): ScanInputs {
  const handle = ({ name, path }: FoundFile) => ({ kind: 'path' as const, name, path });
  return { scan: handle(scan), companions: companions.map(handle) };
}
