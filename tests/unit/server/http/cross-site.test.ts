import { expect, test } from 'vitest'
import { isCrossSite } from '../../../../server/http/cross-site'

const BASE = 'https://orbits.example.org'

test.each([
  ['a page of this site', { secFetchSite: 'same-origin', origin: BASE }, false],
  ['an address typed by hand', { secFetchSite: 'none' }, false],
  ['a page of another site', { secFetchSite: 'cross-site', origin: 'https://elsewhere.example' }, true],
  ['a page of a sister host', { secFetchSite: 'same-site', origin: 'https://www.example.org' }, true],
  ['a browser that tells the origin only', { origin: BASE, host: 'orbits.example.org' }, false],
  ['a host of its own behind a proxy', { origin: 'http://192.0.2.7:3000', host: '192.0.2.7:3000' }, false],
  ['another origin only', { origin: 'https://elsewhere.example', host: 'orbits.example.org' }, true],
  ['a page without an origin', { origin: 'null', host: 'orbits.example.org' }, true],
  ['a program', { host: 'orbits.example.org' }, false],
])('%s', (_name, headers, expected) => {
  expect(isCrossSite(headers, BASE)).toBe(expected)
})
