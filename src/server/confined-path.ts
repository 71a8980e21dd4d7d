import { realpath, stat } from 'node:fs/promises';
import { join, sep } from 'node:path';
import { isRefusal, refuse, type Refusal } from '../base/index.ts';
import { isMissing } from './file-error.ts';
import { worksheetSegments } from './worksheet-name.ts';

/** Where a worksheet lies after all links are resolved, and whether a file is there already. */
export interface ConfinedPath {
  readonly path: string;
  readonly exists: boolean;
}

/**
 * Finds the file of a worksheet, and refuses one that lies outside the folder once links are resolved. Of a file that
 * does not exist yet the parent folder is resolved, and must exist.
 *
 * @param root the worksheet folder, itself resolved
 * @param name path relative to it, as in {@link worksheetSegments}
 * @returns the place, or the refusal `bad-name`, `outside`, `no-folder` or `not-a-file`
 */
export async function confinedPath(root: string, name: string): Promise<ConfinedPath | Refusal> {
  const segments = worksheetSegments(name);
  if (isRefusal(segments)) return segments;
  const path = await resolved(join(root, ...segments));
  if (path !== null) return existingFile(root, name, path);
  return newFile(root, name, segments);
}

async function existingFile(root: string, name: string, path: string) {
  if (!isWithin(root, path)) return outside(name);
  if (!(await stat(path)).isFile()) return refuse('not-a-file', `${name} is not a file.`);
  return { path, exists: true };
}

async function newFile(root: string, name: string, segments: readonly string[]) {
  const parent = await resolved(join(root, ...segments.slice(0, -1)));
  if (parent === null) return refuse('no-folder', `The folder of ${name} does not exist.`);
  if (parent !== root && !isWithin(root, parent)) return outside(name);
  // A link that points nowhere is resolved to nothing above; writing through it could still leave the folder.
  return { path: join(parent, segments[segments.length - 1]), exists: false };
}

function outside(name: string): Refusal {
  return refuse('outside', `${name} leads outside the worksheet folder.`);
}

/** Whether a resolved path lies below a resolved folder. */
export function isWithin(root: string, path: string): boolean {
  return path.startsWith(root.endsWith(sep) ? root : root + sep);
}

async function resolved(path: string): Promise<string | null> {
  try {
    return await realpath(path);
  } catch (error) {
    if (isMissing(error)) return null;
    throw error;
  }
}
