import { randomBytes } from 'node:crypto';
import { open, rename, rm, type FileHandle } from 'node:fs/promises';
import { basename, dirname, join } from 'node:path';

/**
 * Replaces a file as a whole: a reader, or a machine that loses power, sees the old bytes or the new ones and never a
 * part. The bytes go to a hidden file beside it, are flushed, and take the name.
 *
 * @param path the file itself, links resolved
 * @param mode permission bits the file is to have
 */
export async function writeAtomically(path: string, bytes: Uint8Array, mode: number) {
  const temporary = temporaryBeside(path);
  try {
    await writeFlushed(temporary, bytes, mode);
    await rename(temporary, path);
  } catch (error) {
    await rm(temporary, { force: true });
    throw error;
  }
  await flushFolder(dirname(path));
}

/**
 * Creates a file as a whole, and fails with `EEXIST` if the name is taken: the name is claimed empty first.
 *
 * @param path the file itself, links resolved
 */
export async function createAtomically(path: string, bytes: Uint8Array) {
  const claim = await open(path, 'wx');
  let mode: number;
  try {
    mode = (await claim.stat()).mode & 0o777;
  } finally {
    await claim.close();
  }
  try {
    await writeAtomically(path, bytes, mode);
  } catch (error) {
    await rm(path, { force: true });
    throw error;
  }
}

/** Hidden, so that neither the list of worksheets nor the watch on the folder takes it for one. */
function temporaryBeside(path: string): string {
  return join(dirname(path), `.${basename(path)}.${randomBytes(6).toString('hex')}.saving`);
}

async function writeFlushed(path: string, bytes: Uint8Array, mode: number) {
  await withFile(await open(path, 'wx', mode), async (file) => {
    await file.chmod(mode);
    await file.writeFile(bytes);
    await file.sync();
  });
}

/** Flushes the new name itself; some file systems cannot, and then have no need to. */
async function flushFolder(folder: string) {
  try {
    await withFile(await open(folder, 'r'), (file) => file.sync());
  } catch {
    return;
  }
}

async function withFile(file: FileHandle, use: (file: FileHandle) => Promise<void>) {
  try {
    await use(file);
  } finally {
    await file.close();
  }
}
