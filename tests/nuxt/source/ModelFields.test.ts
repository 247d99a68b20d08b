import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import ModelFields from '~/components/source/ModelFields.vue'
import { emptySource } from '~/services/TypedSource'

const labelsOf = async (kind: 'expression' | 'coefficients' | 'zerosPoles', sampling: string | null = null) => {
  const fields = await mountSuspended(ModelFields, { props: { modelValue: { ...emptySource(), kind }, faults: [], sampling, errorAt: () => undefined } })
  return { labels: fields.findAll('label').map(label => label.text()).join(' | '), text: fields.text() }
}

describe('the fields of a model', () => {
  it('of an expression have no zeros and poles, whether its blocks are sampled or not', async () => {
    expect((await labelsOf('expression')).labels).not.toMatch(/Zeros|Numerator/)
    const sampled = await labelsOf('expression', 'sampled every 20 us by C')
    expect(sampled.labels).not.toMatch(/Zeros|Numerator/)
    expect(sampled.text).toContain('The loop is sampled every 20 us by C.')
    expect(sampled.labels).toMatch(/^As its blocks are .*L, the loop gain/)
    expect((await labelsOf('expression')).labels).toMatch(/^Continuous, in s .*L\(s\), the loop gain/)
  })

  it('of coefficients and of roots are their own alone', async () => {
    expect((await labelsOf('coefficients')).labels).toMatch(/Numerator.*Denominator/)
    expect((await labelsOf('coefficients')).labels).not.toContain('Zeros')
    expect((await labelsOf('zerosPoles')).labels).toMatch(/Zeros.*Poles.*Gain/)
  })
})
