import type { ModalGain } from '#shared/types/block'

/**
 * Modal tables of rates (derivative 1, rigid bodies of power -1) as state-space matrices in one CSV text, one set a condition, stacked. Each mode has the states
 * w q and q', so that A holds [0 w; -w -2 damping w] for it; each rigid body its rate, slowed by the friction of its bearings (1/s, one for each body; 0 where
 * there is none). Numbers have the shortest digits that give the same double back.
 */
export function makeMatrices(tables: readonly { code: string, table: ModalGain }[], friction: readonly number[] = []): string {
  const [first] = tables
  if (first === undefined) throw new Error('There is no modal table to make matrices of.')
  return [
    '# Invented data: state-space matrices computed from modal tables by a script.',
    `inputs,${first.table.inputs.join(',')}`,
    `outputs,${first.table.outputs.join(',')}`,
    ...tables.flatMap(({ code, table }) => {
      const { a, b, c, d } = matricesOf(table, friction)
      return [`condition,${code}`, ...section('A', a), ...section('B', b), ...section('C', c), ...section('D', d)]
    }),
    '',
  ].join('\n')
}

const section = (name: string, rows: number[][]) => [name, ...rows.map(row => row.join(','))]

function matricesOf({ modes, rigid, frequencyUnit, inputs, outputs, derivative }: ModalGain, friction: readonly number[]) {
  if (derivative !== 1 || rigid.some(term => term.power !== -1)) throw new Error('Only modal tables of rates are made into matrices here.')
  const order = 2 * modes.length + rigid.length
  const zeros = (rows: number, columns: number) => Array.from({ length: rows }, () => new Array<number>(columns).fill(0))
  const [a, b, c, d] = [zeros(order, order), zeros(order, inputs.length), zeros(outputs.length, order), zeros(outputs.length, inputs.length)]
  const connect = (state: number, { gainIn, gainOut }: { gainIn: number[], gainOut: number[] }) => {
    b[state] = [...gainIn]
    gainOut.forEach((gain, output) => (c[output] as number[])[state] = gain)
  }
  modes.forEach((mode, index) => {
    const w = frequencyUnit === 'Hz' ? 2 * Math.PI * mode.frequency : mode.frequency
    const [position, rate] = [2 * index, 2 * index + 1]
    ;(a[position] as number[])[rate] = w
    ;(a[rate] as number[])[position] = -w
    ;(a[rate] as number[])[rate] = -2 * mode.damping * w
    connect(rate, mode)
  })
  rigid.forEach((term, index) => {
    const state = 2 * modes.length + index
    ;(a[state] as number[])[state] = -(friction[index] ?? 0) || 0
    connect(state, term)
  })
  return { a, b, c, d }
}
