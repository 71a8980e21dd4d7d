import { randomBytes, timingSafeEqual } from 'node:crypto';

/** What of a request decides whether it comes from our own page; header values as sent, null where absent. */
export interface RequestFacts {
  readonly method: string;
  /** Path of the address, starting with `/`. */
  readonly path: string;
  readonly host: string | null;
  readonly origin: string | null;
  /** `Sec-Fetch-Site`. */
  readonly site: string | null;
  /** `Sec-Fetch-Mode`. */
  readonly mode: string | null;
}

const LOOPBACK_NAMES: readonly string[] = ['127.0.0.1', 'localhost', '[::1]'];
const OWN_SITES: readonly (string | null)[] = [null, 'same-origin', 'none'];

/** Headers that every answer carries. The content security policy is the page's own. */
export const SECURITY_HEADERS: Readonly<Record<string, string>> = {
  'x-content-type-options': 'nosniff',
  'x-frame-options': 'DENY',
  'referrer-policy': 'no-referrer',
  'cross-origin-opener-policy': 'same-origin',
  'cross-origin-resource-policy': 'same-origin',
};

/**
 * Why a request is refused, or null. A page of another site must not reach the files: neither under a name of its
 * own that points to this machine (Host), nor from its own address (Origin, Sec-Fetch-Site). Following a link to
 * the page is allowed.
 *
 * @param port the port that the service listens on
 */
export function refusalOfRequest(facts: RequestFacts, port: number): string | null {
  const hosts = LOOPBACK_NAMES.map((name) => `${name}:${port}`);
  if (facts.host === null || !hosts.includes(facts.host.toLowerCase())) {
    return 'This service answers only under its own address on this machine.';
  }
  if (
    facts.origin !== null &&
    facts.origin.toLowerCase() !== `http://${facts.host.toLowerCase()}`
  ) {
    return 'Another site may not use this service.';
  }
  if (OWN_SITES.includes(facts.site) || isFollowedLink(facts)) return null;
  return 'Another site may not use this service.';
}

function isFollowedLink({ method, path, mode, origin }: RequestFacts): boolean {
  return method === 'GET' && mode === 'navigate' && origin === null && !path.startsWith('/api/');
}

/** Makes the secret that a write must carry; it lives as long as the process. */
export function newToken(): string {
  return randomBytes(32).toString('base64url');
}

/** Whether a write carries the secret. */
export function carriesToken(sent: string | null, token: string): boolean {
  if (sent === null) return false;
  const [a, b] = [Buffer.from(sent), Buffer.from(token)];
  return a.length === b.length && timingSafeEqual(a, b);
}
