import { resolve } from 'node:path';
import { isRefusal, type Refusal } from '../base/index.ts';
import { newToken } from './access.ts';
import { watchFolder, type FolderWatch } from './watch.ts';
import { openFolder, type WorksheetFolder } from './worksheet-folder.ts';

/** Everything that the routes work on. */
export interface FileService {
  readonly folder: WorksheetFolder;
  readonly watch: FolderWatch;
  /** The secret that a write must carry. */
  readonly token: string;
}

/** The variables by which `serve` tells the page's server what to serve. */
export const FOLDER_VARIABLE = 'LOOPWRIGHT_FOLDER';
export const PORT_VARIABLE = 'LOOPWRIGHT_PORT';
const DEFAULT_FOLDER = 'worksheets';

/** Opens the service on the folder that the environment names, or `worksheets` in the working directory. */
export async function openService(
  environment: Readonly<Record<string, string | undefined>>,
): Promise<FileService | Refusal> {
  const folder = await openFolder(resolve(environment[FOLDER_VARIABLE] ?? DEFAULT_FOLDER));
  if (isRefusal(folder)) return folder;
  return { folder, watch: watchFolder(folder), token: newToken() };
}
