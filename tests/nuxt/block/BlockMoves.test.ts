import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import BlockMoves from '~/components/block/BlockMoves.vue'

const draft = { isNew: false, isChanged: true, isReadable: true, effects: null, refusal: null, pending: false, isOld: true, loops: [], conditions: [], systemId: 1 }
const wordsOf = async (change: Partial<typeof draft>) => (await mountSuspended(BlockMoves, { props: { ...draft, ...change } })).find('[role=status]').text()

describe('what a draft moves', () => {
  it('is not said to be computed where the draft cannot be read', async () => {
    expect(await wordsOf({ isReadable: false })).toBe('What moves shows here as soon as the gain can be read.')
    expect(await wordsOf({})).toBe('Computing what moves …')
  })
})
