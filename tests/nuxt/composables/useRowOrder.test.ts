import { describe, expect, it } from 'vitest'
import { nextTick, ref } from 'vue'
import { useRowOrder } from '~/composables/useRowOrder'

const source = () => ref([{ id: 1 }, { id: 2 }, { id: 3 }])
const ids = (rows: { id: number }[]) => rows.map(row => row.id)

describe('rows that are put in order', () => {
  it('do not leave the list at its ends', async () => {
    const sent: number[][] = []
    const order = useRowOrder(source(), async ids => void sent.push(ids))
    await order.move(1, -1)
    await order.move(3, 1)
    expect(sent).toEqual([])
  })

  it('move by buttons, and the new place is told', async () => {
    const sent: number[][] = []
    const order = useRowOrder(source(), async ids => void sent.push(ids))
    await order.move(3, -1)
    expect(sent).toEqual([[1, 3, 2]])
    expect(order.said.value).toBe('Moved to place 2 of 3.')
  })

  it('follow the pointer while they are dragged and are sent once, when they are dropped', async () => {
    const sent: number[][] = []
    const order = useRowOrder(source(), async ids => void sent.push(ids))
    order.drag.start(1, new Event('dragstart') as DragEvent)
    order.drag.over(2, new Event('dragover') as DragEvent)
    order.drag.over(3, new Event('dragover') as DragEvent)
    expect(ids(order.rows.value)).toEqual([2, 3, 1])
    expect(sent).toEqual([])
    await order.drag.end()
    expect(sent).toEqual([[2, 3, 1]])
  })

  it('are again as the server has them when it refused', async () => {
    const order = useRowOrder(source(), () => Promise.reject(new Error('refused')))
    await expect(order.move(3, -1)).rejects.toThrow('refused')
    expect(ids(order.rows.value)).toEqual([1, 2, 3])
  })

  it('take up what was added meanwhile', async () => {
    const rows = source()
    const order = useRowOrder(rows, async () => {
      rows.value = [{ id: 1 }, { id: 3 }, { id: 2 }, { id: 4 }]
    })
    await order.move(3, -1)
    await nextTick()
    expect(ids(order.rows.value)).toEqual([1, 3, 2, 4])
  })
})
