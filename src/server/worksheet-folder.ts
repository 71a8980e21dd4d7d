import { constants } from 'node:fs';
import { access, readFile, readdir, realpath, stat } from 'node:fs/promises';
import { join } from 'node:path';
import { isRefusal, refuse, type Refusal } from '../base/index.ts';
import { createAtomically, writeAtomically } from './atomic-write.ts';
import { confinedPath, type ConfinedPath } from './confined-path.ts';
import { fileErrorCode, fileRefusal } from './file-error.ts';
import { contentHash, decodeWorksheet, encodeWorksheet, refuseSize } from './worksheet-bytes.ts';
import { DEEPEST_SUBFOLDER, isListedFolder, worksheetSegments } from './worksheet-name.ts';

/** A worksheet in the list; `modified` is in milliseconds since 1970. */
export interface WorksheetEntry {
  readonly name: string;
  readonly modified: number;
  readonly hash: string;
}

/** A worksheet as it is on disk. */
export interface OpenWorksheet {
  readonly name: string;
  readonly text: string;
  readonly hash: string;
  readonly readOnly: boolean;
}

/**
 * What is on disk where somebody else's version would have been overwritten. A file that was removed is an empty text
 * without a hash: to save it anew is to save over `hash`, in this case too.
 */
export interface SaveConflict {
  readonly kind: 'conflict';
  readonly text: string;
  readonly hash: string | null;
}

/** The hash of what is now on disk. */
export interface SavedWorksheet {
  readonly kind: 'saved';
  readonly hash: string;
}

/** A folder of worksheets; every file operation of the program goes through it. */
export interface WorksheetFolder {
  /** The folder, links resolved. */
  readonly path: string;
  /** All worksheets, by name, or why the folder cannot be read. */
  list(): Promise<readonly WorksheetEntry[] | Refusal>;
  /** One worksheet, or why it cannot be opened. */
  open(name: string): Promise<OpenWorksheet | Refusal>;
  /**
   * Writes `text` if the file still has the hash `baseHash` (null: does not exist yet).
   * One save runs at a time, so that of two pages that save at once the second is told.
   */
  save(
    name: string,
    text: string,
    baseHash: string | null,
  ): Promise<SavedWorksheet | SaveConflict | Refusal>;
}

/**
 * Opens a folder of worksheets.
 *
 * @returns the folder, or the refusal `missing`, `file-error` or `not-a-folder`
 */
export async function openFolder(path: string): Promise<WorksheetFolder | Refusal> {
  let root: string;
  try {
    root = await realpath(path);
    if (!(await stat(root)).isDirectory())
      return refuse('not-a-folder', `${path} is not a folder.`);
  } catch (error) {
    return fileRefusal(error, path);
  }
  let lastSave: Promise<unknown> = Promise.resolve();
  return {
    path: root,
    list: () => listWorksheets(root).catch((error: unknown) => fileRefusal(error, path)),
    open: (name) => openWorksheet(root, name),
    save(name, text, baseHash) {
      const save = lastSave.then(() => saveWorksheet(root, name, text, baseHash));
      lastSave = save.catch(() => undefined);
      return save;
    },
  };
}

async function listWorksheets(root: string): Promise<readonly WorksheetEntry[]> {
  const names = await worksheetNames(root, '', 0);
  const entries: WorksheetEntry[] = [];
  // One at a time: a process may have only so many files open.
  for (const name of names) {
    const entry = await worksheetEntry(root, name);
    if (entry !== null) entries.push(entry);
  }
  return entries.sort((a, b) => a.name.localeCompare(b.name, 'en', { numeric: true }));
}

async function worksheetNames(root: string, prefix: string, depth: number): Promise<string[]> {
  const found = await readdir(join(root, prefix), { withFileTypes: true });
  const names = await Promise.all(
    found.map((entry) => {
      const name = prefix + entry.name;
      if (!entry.isDirectory()) return isRefusal(worksheetSegments(name)) ? [] : [name];
      const listed = depth < DEEPEST_SUBFOLDER && isListedFolder(entry.name);
      return listed ? worksheetNames(root, `${name}/`, depth + 1).catch(() => []) : [];
    }),
  );
  return names.flat();
}

/** The list's row of a file; null for what cannot be opened at all (a link out of the folder, a file just removed). */
async function worksheetEntry(root: string, name: string): Promise<WorksheetEntry | null> {
  try {
    const place = await confinedPath(root, name);
    if (isRefusal(place) || !place.exists) return null;
    const { mtimeMs, size } = await stat(place.path);
    if (refuseSize(size) !== null) return { name, modified: mtimeMs, hash: '' };
    return { name, modified: mtimeMs, hash: contentHash(await readFile(place.path)) };
  } catch (error) {
    if (fileErrorCode(error) === null) throw error;
    return null;
  }
}

async function openWorksheet(root: string, name: string): Promise<OpenWorksheet | Refusal> {
  try {
    const place = await confinedPath(root, name);
    if (isRefusal(place)) return place;
    if (!place.exists) return refuse('missing', `There is no worksheet ${name}.`);
    const bytes = await readBounded(place.path);
    if (isRefusal(bytes)) return bytes;
    const text = decodeWorksheet(bytes);
    if (isRefusal(text)) return text;
    return { name, text, hash: contentHash(bytes), readOnly: !(await isWritable(place.path)) };
  } catch (error) {
    return fileRefusal(error, name);
  }
}

async function readBounded(path: string): Promise<Uint8Array | Refusal> {
  return refuseSize((await stat(path)).size) ?? (await readFile(path));
}

/** Whether the file is meant to be written: the mode counts even for a user who may write everything. */
async function isWritable(path: string): Promise<boolean> {
  const { mode } = await stat(path);
  if ((mode & 0o222) === 0) return false;
  return access(path, constants.W_OK).then(
    () => true,
    () => false,
  );
}

async function saveWorksheet(root: string, name: string, text: string, baseHash: string | null) {
  const bytes = encodeWorksheet(text);
  if (isRefusal(bytes)) return bytes;
  try {
    const place = await confinedPath(root, name);
    if (isRefusal(place)) return place;
    return await (place.exists
      ? replace(place, name, bytes, baseHash)
      : create(place, bytes, baseHash));
  } catch (error) {
    return fileRefusal(error, name);
  }
}

async function replace(
  { path }: ConfinedPath,
  name: string,
  bytes: Uint8Array,
  baseHash: string | null,
): Promise<SavedWorksheet | SaveConflict | Refusal> {
  const onDisk = await readFile(path);
  const hash = contentHash(onDisk);
  if (hash !== baseHash) return conflict(onDisk, hash);
  if (!(await isWritable(path))) return refuse('read-only', `${name} is read-only.`);
  await writeAtomically(path, bytes, (await stat(path)).mode & 0o777);
  return { kind: 'saved', hash: contentHash(bytes) };
}

async function create(
  { path }: ConfinedPath,
  bytes: Uint8Array,
  baseHash: string | null,
): Promise<SavedWorksheet | SaveConflict | Refusal> {
  if (baseHash !== null) return { kind: 'conflict', text: '', hash: null };
  try {
    await createAtomically(path, bytes);
  } catch (error) {
    if (fileErrorCode(error) !== 'EEXIST') throw error;
    const onDisk = await readFile(path);
    return conflict(onDisk, contentHash(onDisk));
  }
  return { kind: 'saved', hash: contentHash(bytes) };
}

function conflict(onDisk: Uint8Array, hash: string): SaveConflict | Refusal {
  const text = decodeWorksheet(onDisk);
  return isRefusal(text) ? text : { kind: 'conflict', text, hash };
}
