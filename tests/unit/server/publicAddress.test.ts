import { describe, expect, it } from 'vitest'
import { publicAddress } from '#server/adapters/publicAddress'

describe('the address links begin with', () => {
  it.each(['margins.example.org', 'ftp://margins.example.org', 'javascript:alert(1)'])('is refused where it is configured as %s', (given) => {
    expect(() => publicAddress({ WIDEBERTH_URL: given })).toThrow('WIDEBERTH_URL must be an address')
  })

  it('is localhost with the port served where none is configured', () => {
    expect(publicAddress({ PORT: '8080' }).href).toBe('http://localhost:8080/')
    expect(publicAddress({}).href).toBe('http://localhost:3000/')
  })
})
