/** What dropped files will be taken for, said while they hover. */

/** @param opening - name of the scan whose import sheet is open, or null */
export function dropInWords(opening: string | null): string {
  return opening === null
    ? 'Drop a scan, with its height map or axis, or a recipe. Nothing leaves this machine.'
    : `Drop a height map or an axis: it is read together with ${opening}.`;
}
