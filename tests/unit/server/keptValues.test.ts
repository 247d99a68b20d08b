import { describe, expect, it } from 'vitest'
import { KeptValues } from '#server/services/uploads/KeptValues'

const keysOf = (kept: KeptValues<string>, keys: string[]) => keys.filter(key => kept.get(key) !== undefined)

describe('kept values', () => {
  it('are those used last, not those made last', () => {
    const kept = new KeptValues<string>(3)
    for (const key of ['a', 'b', 'c']) kept.set(key, key, 1)
    kept.get('a')
    kept.set('d', 'd', 1)
    expect(keysOf(kept, ['a', 'b', 'c', 'd'])).toEqual(['a', 'c', 'd'])
  })

  it('are as many as fit, however many that are: forty small files read in turn stay', () => {
    const kept = new KeptValues<string>(400)
    const files = Array.from({ length: 40 }, (_, index) => `file ${index}`)
    for (const file of files) kept.set(file, file, 10)
    expect(keysOf(kept, files)).toEqual(files)
  })

  it('are one alone where it is larger than all may be together, and none is counted twice', () => {
    const kept = new KeptValues<string>(10)
    kept.set('small', 'small', 4)
    kept.set('large', 'large', 100)
    expect(keysOf(kept, ['small', 'large'])).toEqual(['large'])
    kept.set('small', 'small', 4)
    for (let again = 0; again < 5; again++) kept.set('other', 'other', 4)
    expect(keysOf(kept, ['small', 'large', 'other'])).toEqual(['small', 'other'])
  })
})
