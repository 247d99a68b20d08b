import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import { checkExpression } from '#shared/analysis/expressions/checkExpression'
import ExpressionField from '~/components/source/ExpressionField.vue'

const mount = (text: string, parameterNames: string[] = []) => mountSuspended(ExpressionField, {
  props: { modelValue: text, variable: 's', faults: checkExpression(text, { variable: 's', parameterNames }) },
})

describe('the field of an expression', () => {
  it('marks a name that is not known where it stands', async () => {
    const field = await mount('25*(s+wz)/s')
    expect(field.find('mark').text()).toBe('wz')
    expect(field.find('ul').text()).toContain('at character 7')
    expect(field.find('textarea').attributes('aria-invalid')).toBe('true')
  })

  it('tells a fault at the end where something is still missing', async () => {
    expect((await mount('25/')).find('ul').text()).toMatch(/at the end|at character/)
  })

  it('marks nothing where all is right', async () => {
    const field = await mount('k*(s+2)/(s*(s+10))*exp(-0.01*s)', ['k'])
    expect(field.find('mark').exists()).toBe(false)
    expect(field.find('textarea').attributes('aria-invalid')).toBeUndefined()
  })

  it('shows what was typed as text, never as markup', async () => {
    const field = await mount('<img src=x>')
    expect(field.find('img').exists()).toBe(false)
  })
})
