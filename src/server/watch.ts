import { relative, sep } from 'node:path';
import { isRefusal } from '../base/index.ts';
import { DEEPEST_SUBFOLDER, isListedFolder, worksheetSegments } from './worksheet-name.ts';
import type { WorksheetFolder } from './worksheet-folder.ts';

/** What happened to a worksheet on disk, by whomever. */
export type FolderChange =
  | { readonly kind: 'added'; readonly name: string; readonly hash: string }
  | { readonly kind: 'changed'; readonly name: string; readonly hash: string }
  | { readonly kind: 'removed'; readonly name: string };

export type ChangeListener = (change: FolderChange) => void;

/** Tells listeners what happens in a folder; it watches only while somebody listens. */
export interface FolderWatch {
  /** Adds a listener; the function that comes back, once the watch stands, takes it away. */
  listen(listener: ChangeListener): Promise<() => void>;
}

interface RunningWatch {
  close(): Promise<void>;
}

/** Makes the watch on a worksheet folder. */
export function watchFolder(folder: WorksheetFolder): FolderWatch {
  const listeners = new Set<ChangeListener>();
  let running: Promise<RunningWatch> | null = null;
  const tell: ChangeListener = (change) => listeners.forEach((listener) => listener(change));

  function stopListening(listener: ChangeListener) {
    if (!listeners.delete(listener) || listeners.size > 0) return;
    void running?.then((watch) => watch.close());
    running = null;
  }

  return {
    async listen(listener) {
      listeners.add(listener);
      running ??= startWatch(folder, tell);
      await running;
      return () => stopListening(listener);
    },
  };
}

async function startWatch(folder: WorksheetFolder, tell: ChangeListener): Promise<RunningWatch> {
  const { watch } = await import('chokidar');
  const watcher = watch(folder.path, {
    ignoreInitial: true,
    followSymlinks: false,
    depth: DEEPEST_SUBFOLDER,
    // An editor that writes in two steps is reported once, when the file has settled.
    awaitWriteFinish: { stabilityThreshold: 80, pollInterval: 20 },
    ignored: (path, stats) => isIgnored(folder.path, path, stats?.isFile() ?? false),
  });
  const name = (path: string) => relative(folder.path, path).split(sep).join('/');
  watcher.on('add', (path) => void report(folder, 'added', name(path), tell));
  watcher.on('change', (path) => void report(folder, 'changed', name(path), tell));
  watcher.on('unlink', (path) => tell({ kind: 'removed', name: name(path) }));
  await new Promise<void>((settle) => watcher.once('ready', settle));
  return watcher;
}

function isIgnored(root: string, path: string, isFile: boolean): boolean {
  const segments = relative(root, path).split(sep);
  if (segments[0] === '') return false;
  if (isFile) return isRefusal(worksheetSegments(segments.join('/')));
  // A path of unknown kind is looked at: it may be a folder, and a file is asked about again once its kind is known.
  return !segments.every((segment) => isListedFolder(segment));
}

/** A worksheet that cannot be opened (any more) has no hash; whoever has it open asks for it and is told why. */
async function report(
  folder: WorksheetFolder,
  kind: 'added' | 'changed',
  name: string,
  tell: ChangeListener,
) {
  const opened = await folder.open(name);
  tell({ kind, name, hash: isRefusal(opened) ? '' : opened.hash });
}
