import { describe, expect, it } from 'vitest'
import { contentDisposition } from '#server/http/contentDisposition'

describe('the header that names a file', () => {
  it('cannot be broken out of by the name', () => {
    expect(contentDisposition('attachment', 'a"; filename="b.exe\r\nx: y')).toBe('attachment; filename="a__ filename__b.exe__x_ y"; filename*=UTF-8\'\'a%22%3B%20filename%3D%22b.exe%0D%0Ax%3A%20y')
  })

  // RFC 6266, appendix D: an ASCII name for old readers and the true one beside it; RFC 5987, 3.2.1: of ' ( ) * none stands plain
  it('carries the true name beside a plain one', () => {
    expect(contentDisposition('inline', '€ rates (1).csv')).toBe('inline; filename="_ rates _1_.csv"; filename*=UTF-8\'\'%E2%82%AC%20rates%20%281%29.csv')
  })
})
