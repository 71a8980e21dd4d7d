/** A worksheet in the folder. `hash` is that of its bytes on disk. */
export interface WorksheetEntry {
  readonly name: string;
  readonly modified: string | number;
  readonly hash: string;
}

export interface Folder {
  readonly folder: string;
  readonly worksheets: readonly WorksheetEntry[];
}

/** A worksheet's text as it stands on disk. */
export interface StoredText {
  readonly text: string;
  readonly hash: string;
}

/** What came of saving: saved, refused because the file changed on disk, or refused with words. */
export type SaveOutcome =
  | { readonly kind: 'saved'; readonly hash: string }
  | { readonly kind: 'conflict'; readonly disk: StoredText }
  | FileFailure;

/** `offline`: the service does not answer; otherwise it refused, and `message` says why. */
export interface FileFailure {
  readonly kind: 'failed';
  readonly message: string;
  readonly offline: boolean;
}

export interface FolderEvents {
  readonly onChanged: (name: string, hash: string) => void;
  readonly onRemoved: (name: string) => void;
  readonly onAdded: (name: string) => void;
  /** Whether the service can be heard. */
  readonly onConnection: (connected: boolean) => void;
}

/** The local file service, as the page speaks to it. */
export interface FileService {
  list(): Promise<Folder | FileFailure>;
  read(name: string): Promise<StoredText | FileFailure>;
  /** Saves over the file whose hash is `baseHash`; null makes a new one. */
  save(name: string, text: string, baseHash: string | null): Promise<SaveOutcome>;
  /** Listens to the folder until the returned function is called. */
  listen(events: FolderEvents): () => void;
}

const OFFLINE: FileFailure = {
  kind: 'failed',
  message: 'The worksheet service does not answer. Is `loopwright serve` still running?',
  offline: true,
};

/** The file service of the program that served the page. */
export function createFileService(): FileService {
  let token: Promise<string> | null = null;
  const currentToken = () => (token ??= fetchToken());
  return {
    list: () => getJson<Folder>('/api/worksheets'),
    read: (name) => getJson<StoredText>(addressOf(name)),
    async save(name, text, baseHash) {
      try {
        let response = await put(name, text, baseHash, await currentToken());
        if (response.status === 403) {
          // The service was restarted since the page was loaded and has another token.
          token = fetchToken();
          response = await put(name, text, baseHash, await token);
        }
        return await outcomeOf(response);
      } catch {
        token = null;
        return OFFLINE;
      }
    },
    listen: listenTo,
  };
}

/** Whether an answer of the service is a failure. */
export function isFailure(answer: unknown): answer is FileFailure {
  return (answer as { kind?: unknown }).kind === 'failed';
}

function addressOf(name: string): string {
  return `/api/worksheets/${name.split('/').map(encodeURIComponent).join('/')}`;
}

async function fetchToken(): Promise<string> {
  const response = await fetch('/api/session');
  if (!response.ok) throw new Error('the service gave no token');
  return ((await response.json()) as { token: string }).token;
}

function put(name: string, text: string, baseHash: string | null, token: string) {
  return fetch(addressOf(name), {
    method: 'PUT',
    headers: { 'content-type': 'application/json', 'x-loopwright-token': token },
    body: JSON.stringify({ text, baseHash }),
  });
}

async function outcomeOf(response: Response): Promise<SaveOutcome> {
  if (response.ok) {
    return { kind: 'saved', hash: ((await response.json()) as { hash: string }).hash };
  }
  if (response.status === 409) {
    return { kind: 'conflict', disk: (await response.json()) as StoredText };
  }
  return failureOf(response);
}

async function getJson<Answer>(address: string): Promise<Answer | FileFailure> {
  try {
    const response = await fetch(address);
    return response.ok ? ((await response.json()) as Answer) : await failureOf(response);
  } catch {
    return OFFLINE;
  }
}

async function failureOf(response: Response): Promise<FileFailure> {
  const body = (await response.json().catch(() => null)) as { message?: string } | null;
  const message = body?.message ?? `The worksheet service answered ${response.status}.`;
  return { kind: 'failed', message, offline: false };
}

function listenTo(events: FolderEvents): () => void {
  const source = new EventSource('/api/events');
  const on = (kind: string, handle: (data: { name: string; hash: string }) => void) =>
    source.addEventListener(kind, (event) =>
      handle(JSON.parse((event as MessageEvent<string>).data)),
    );
  on('changed', ({ name, hash }) => events.onChanged(name, hash));
  on('removed', ({ name }) => events.onRemoved(name));
  on('added', ({ name }) => events.onAdded(name));
  source.onopen = () => events.onConnection(true);
  source.onerror = () => events.onConnection(false);
  return () => source.close();
}
