import { refuse, type Refusal } from '../base/index.ts';

/** The code of a file-system error (`ENOENT` …), or null for anything else. */
export function fileErrorCode(error: unknown): string | null {
  if (!(error instanceof Error)) return null;
  const { code } = error as NodeJS.ErrnoException;
  return typeof code === 'string' ? code : null;
}

/** Whether an error says that nothing is at the path. */
export function isMissing(error: unknown): boolean {
  const code = fileErrorCode(error);
  return code === 'ENOENT' || code === 'ENOTDIR';
}

const REASONS: Readonly<Record<string, string>> = {
  EACCES: 'permission is denied',
  EPERM: 'permission is denied',
  EROFS: 'the disk is read-only',
  ENOSPC: 'the disk is full',
  EDQUOT: 'the disk quota is used up',
  EISDIR: 'it is a folder',
  ELOOP: 'its links go in a circle',
  ENAMETOOLONG: 'its name is too long',
  ENOENT: 'there is no such file',
  ENOTDIR: 'there is no such file',
};

/**
 * Says in words what the file system answered.
 *
 * @returns the refusal `missing` or `file-error`; an error that is not the file system's is thrown on
 */
export function fileRefusal(error: unknown, name: string): Refusal {
  const code = fileErrorCode(error);
  if (code === null) throw error;
  const reason = REASONS[code] ?? `the file system answers ${code}`;
  return refuse(isMissing(error) ? 'missing' : 'file-error', `${name}: ${reason}.`);
}
