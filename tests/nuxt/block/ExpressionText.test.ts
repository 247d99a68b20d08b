import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import ExpressionText from '~/components/block/ExpressionText.vue'

describe('an expression in a narrow column', () => {
  it('parts behind its operators, and reads and copies as it was typed', async () => {
    const text = await mountSuspended(ExpressionText, { props: { text: '(s^2/(1.12*wVer)^2+0.04*s/wVer+1)/(s+G[1, 2])' } })
    expect(text.text()).toBe('(s^2/(1.12*wVer)^2+0.04*s/wVer+1)/(s+G[1, 2])')
    expect(text.html().replace(/\s*\n\s*/g, '').split('<wbr>').slice(1).map(part => part.replace(/<.*$/, ''))).toEqual(['(1.12*', 'wVer)^2+', '0.04*', 's/', 'wVer+', '1)/', '(s+', 'G[1, 2])'])
  })
})
