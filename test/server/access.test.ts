import { describe, expect, it } from 'vitest';
import {
  carriesToken,
  newToken,
  refusalOfRequest,
  type RequestFacts,
} from '../../src/server/access.ts';

const own: RequestFacts = {
  method: 'GET',
  path: '/api/worksheets',
  host: '127.0.0.1:4600',
  origin: null,
  site: 'same-origin',
  mode: 'cors',
};
const verdict = (facts: Partial<RequestFacts>) => refusalOfRequest({ ...own, ...facts }, 4600);
const OTHER_HOST = 'This service answers only under its own address on this machine.';
const OTHER_SITE = 'Another site may not use this service.';

describe('a request', () => {
  it.each(['127.0.0.1:4600', 'localhost:4600', 'LOCALHOST:4600', '[::1]:4600'])(
    'to the loopback name %s is answered',
    (host) => {
      expect(verdict({ host })).toBeNull();
    },
  );

  it.each([
    ...['evil.example:4600', '127.0.0.1', '127.0.0.1:4601', 'localhost.evil.example:4600'],
    ...['0.0.0.0:4600', '127.0.0.1:4600@evil.example', '', null],
  ])('to the host %j is refused', (host) => {
    expect(verdict({ host })).toBe(OTHER_HOST);
  });

  it.each(['http://evil.example', 'null', 'https://127.0.0.1:4600', 'http://127.0.0.1:4601'])(
    'from the origin %j is refused',
    (origin) => {
      expect(verdict({ origin })).toBe(OTHER_SITE);
    },
  );

  it('from the page itself is answered, whichever loopback name it was opened under', () => {
    expect(verdict({ host: 'localhost:4600', origin: 'http://localhost:4600' })).toBeNull();
  });

  it('from one loopback name to another is refused', () => {
    expect(verdict({ origin: 'http://localhost:4600' })).toBe(OTHER_SITE);
  });

  it.each(['cross-site', 'same-site'])('that the browser calls %s is refused', (site) => {
    expect(verdict({ site })).toBe(OTHER_SITE);
    expect(verdict({ site, path: '/', mode: 'no-cors' })).toBe(OTHER_SITE);
    expect(verdict({ site, mode: 'navigate' })).toBe(OTHER_SITE);
    expect(verdict({ site, path: '/', mode: 'navigate', method: 'POST' })).toBe(OTHER_SITE);
  });

  it('that follows a link of another site to the page is answered', () => {
    expect(verdict({ site: 'cross-site', path: '/', mode: 'navigate' })).toBeNull();
  });

  it('of a program that is no browser is answered', () => {
    expect(verdict({ site: null, mode: null })).toBeNull();
  });
});

describe('the token', () => {
  it('is new every time, and long', () => {
    expect(newToken()).not.toBe(newToken());
    expect(newToken().length).toBeGreaterThan(40);
  });

  it('has to be sent whole', () => {
    const token = newToken();
    expect(carriesToken(token, token)).toBe(true);
    for (const sent of [null, '', token.slice(1), `${token} `, newToken()]) {
      expect(carriesToken(sent, token)).toBe(false);
    }
  });
});
