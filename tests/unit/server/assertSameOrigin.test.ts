import { afterEach, describe, expect, it } from 'vitest'
import { assertSameOrigin } from '#server/access/assertSameOrigin'

const ask = (method: string, headers: Record<string, string>) => () => assertSameOrigin({ method, header: name => headers[name] })

afterEach(() => {
  delete process.env.WIDEBERTH_URL
})

describe('a change', () => {
  it('that says nothing of where it comes from is refused', () => {
    expect(ask('POST', { host: 'margins.example.org' })).toThrow('only taken from the pages')
  })

  it.each(['cross-site', 'same-site', 'nonsense'])('from %s is refused, whatever origin it names', (site) => {
    expect(ask('DELETE', { 'sec-fetch-site': site, 'origin': 'https://margins.example.org', 'host': 'margins.example.org' })).toThrow()
  })

  it('from our own pages is taken', () => {
    expect(ask('PATCH', { 'sec-fetch-site': 'same-origin' })).not.toThrow()
    expect(ask('PUT', { 'sec-fetch-site': 'none' })).not.toThrow()
  })

  it('from an old browser is taken by its origin: the host it was sent to, or the configured address behind a proxy', () => {
    expect(ask('POST', { origin: 'http://localhost:3000', host: 'localhost:3000' })).not.toThrow()
    expect(ask('POST', { origin: 'https://margins.example.org', host: '10.0.0.7:3000' })).toThrow()
    process.env.WIDEBERTH_URL = 'https://margins.example.org'
    expect(ask('POST', { origin: 'https://margins.example.org', host: '10.0.0.7:3000' })).not.toThrow()
    expect(ask('POST', { origin: 'https://margins.example.org.evil.example', host: '10.0.0.7:3000' })).toThrow()
    expect(ask('POST', { origin: 'null', host: '10.0.0.7:3000' })).toThrow()
  })
})

describe('a question', () => {
  it('may come from anywhere: it changes nothing', () => {
    expect(ask('GET', { 'sec-fetch-site': 'cross-site' })).not.toThrow()
  })
})
