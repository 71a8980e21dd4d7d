import { refuse, type Refusal } from '../base/index.ts';

const LONGEST_NAME = 240;
/** Subfolders that a worksheet may lie in, counted from the worksheet folder. */
export const DEEPEST_SUBFOLDER = 2;
const WORKSHEET_ENDING = '.md';

/** Why a path segment cannot be part of a worksheet's name, or null. */
function segmentFault(segment: string): string | null {
  if (segment === '' || segment === '.' || segment === '..')
    return 'it leaves the worksheet folder';
  if (segment.startsWith('.')) return 'hidden files are not worksheets';
  if (segment !== segment.trim()) return 'it begins or ends with a space';
  // Control characters (NUL among them) and what other systems take for a separator or a drive.
  if (/[\p{Cc}\\:*?"<>|]/u.test(segment)) return 'it holds a character that file names cannot have';
  return null;
}

/** Whether a folder is looked into when worksheets are listed. */
export function isListedFolder(segment: string): boolean {
  return segmentFault(segment) === null && segment !== 'node_modules';
}

/**
 * Splits a worksheet's name, `mast.md` or `plant/mast.md`, into its path segments.
 *
 * @param name path relative to the worksheet folder, with `/` between folders
 * @returns the segments, or the refusal `bad-name`
 */
export function worksheetSegments(name: string): readonly string[] | Refusal {
  const segments = name.split('/');
  const fault =
    segments.map(segmentFault).find((found) => found !== null) ??
    (name.length > LONGEST_NAME ? `it is longer than ${LONGEST_NAME} characters` : null) ??
    (segments.length > DEEPEST_SUBFOLDER + 1
      ? `it lies more than ${DEEPEST_SUBFOLDER} folders deep`
      : null) ??
    (name.endsWith(WORKSHEET_ENDING) ? null : `a worksheet's name ends in ${WORKSHEET_ENDING}`);
  return fault === null
    ? segments
    : refuse('bad-name', `${JSON.stringify(name)} cannot be a worksheet's name: ${fault}.`);
}
