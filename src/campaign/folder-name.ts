/**
 * Why a walk's name cannot be a folder's name, or null where it can.
 *
 * Results are written to a folder per walk: a name may not lead elsewhere, hide, or mean the same
 * folder as another on a file system that does not tell case apart.
 */
export function folderNameProblem(name: string): string | null {
  if (name === '.' || name === '..') return 'is not a folder name';
  if (/[/\\]/.test(name))
    return 'has a slash; walks are folders in the results, so use letters, digits, - and _';
  if ([...name].some((character) => character < ' ' || character === '\u007f'))
    return 'has a control character; use letters, digits, - and _';
  if (name.startsWith('.')) return 'begins with a dot, which hides its results; use letters, digits, - and _';
  // 255 bytes is the usual limit of file systems; some room is left for endings.
  if (Buffer.byteLength(name) > 200) return `is ${Buffer.byteLength(name)} bytes long; at most 200`;
  return null;
}
