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

  describe('completes names by keyboard', () => {
    const names = [{ name: 'servo', kind: 'block' as const, detail: 'controller' }, { name: 'sensor', kind: 'block' as const }, { name: 'k', kind: 'parameter' as const }]
    const typing = async (text: string) => {
      const field = await mountSuspended(ExpressionField, { props: { modelValue: '', variable: 's', faults: [], names }, attachTo: document.body })
      const area = field.find('textarea')
      area.element.value = text
      area.element.setSelectionRange(text.length, text.length)
      await area.trigger('input')
      return { field, area }
    }

    it('offers what fits, and Enter takes the one that is chosen', async () => {
      const { field, area } = await typing('2*se')
      expect(field.findAll('[role=option]').map(option => option.text())).toEqual(['servocontroller', 'sensorblock'])
      await area.trigger('keydown', { key: 'ArrowDown' })
      expect(field.find('[aria-selected=true]').text()).toContain('sensor')
      expect(area.attributes('aria-activedescendant')).toBe(field.find('[aria-selected=true]').attributes('id'))
      await area.trigger('keydown', { key: 'Enter' })
      expect(field.emitted('update:modelValue')?.at(-1)).toEqual(['2*sensor'])
      expect(field.find('[role=listbox]').exists()).toBe(false)
    })

    it('closes with Escape and leaves what is typed', async () => {
      const { field, area } = await typing('2*se')
      await area.trigger('keydown', { key: 'Escape' })
      expect(field.find('[role=listbox]').exists()).toBe(false)
      expect(field.emitted('update:modelValue')?.at(-1)).toEqual(['2*se'])
    })

    it('leaves Enter to a new line where what is typed is the variable itself', async () => {
      const { field, area } = await typing('1/s')
      expect(field.find('[aria-selected=true]').exists()).toBe(false)
      await area.trigger('keydown', { key: 'Enter' })
      expect(field.emitted('update:modelValue')?.at(-1)).toEqual(['1/s'])
    })
  })
})
