import type { BlockDefinition, BlockGain } from '../types/block'
import { counted } from './counted'
import { describeHold } from './describeHold'
import { formatDelay } from './formatDelay'
import { formatFrequency } from './formatFrequency'
import { significantDigits } from './significantDigits'

const figure = (value: number) => String(Number(value.toPrecision(10)))
const root = ([re, im]: readonly [number, number]) => (im === 0 ? figure(re) : `${figure(re)} ${im < 0 ? '\u2212' : '+'} ${figure(Math.abs(im))}j`)
const list = (values: readonly string[]) => (values.length === 0 ? 'none' : values.join(', '))
const range = (values: readonly number[], format: (value: number) => string) => {
  const least = Math.min(...values)
  const most = Math.max(...values)
  return least === most ? format(least) : `${format(least)} to ${format(most)}`
}
const channels = (inputs: number, outputs: number) => (inputs <= 1 && outputs <= 1 ? [] : [`${counted(inputs, 'input')}, ${counted(outputs, 'output')}`])

function timing({ deadTime, sampleTime }: { deadTime?: number, sampleTime?: number }): string[] {
  return [
    ...(deadTime ? [`dead time ${formatDelay(deadTime)}`] : []),
    ...(sampleTime === undefined ? [] : [`in z, sampled every ${formatDelay(sampleTime)}`]),
  ]
}

function partsOf(gain: BlockGain | BlockDefinition): string[] {
  switch (gain.kind) {
    case 'expression': return [gain.expression, ...timing(gain)]
    case 'coefficients': return [`numerator ${list(gain.numerator.map(figure))}`, `denominator ${list(gain.denominator.map(figure))}`, ...timing(gain)]
    case 'zerosPoles': return [`zeros ${list(gain.zeros.map(root))}`, `poles ${list(gain.poles.map(root))}`, `gain ${figure(gain.gain)}`, ...timing(gain)]
    case 'stateSpace':
      return 'a' in gain
        ? [counted(gain.a.length, 'state'), ...channels(gain.b[0]?.length ?? 0, gain.c.length), ...timing(gain)]
        : [`state space from a file${gain.set === null ? '' : `, set ${gain.set}`}`, ...timing(gain)]
    case 'sections':
      return 'rows' in gain
        ? [counted(gain.rows.length, 'second-order section'), `gain ${gain.gain}`, ...timing(gain)]
        : [counted(gain.sections.length, 'second-order section'), `gain ${figure(gain.gain)}`, ...timing(gain)]
    case 'modal': {
      const [first] = gain.modes
      const inputs = (first ?? gain.rigid[0])?.gainIn.length ?? 0
      const outputs = (first ?? gain.rigid[0])?.gainOut.length ?? 0
      return [
        counted(gain.modes.length, 'mode'),
        ...(first ? [`${range(gain.modes.map(mode => mode.frequency), value => formatFrequency(value))} ${gain.frequencyUnit}`, `damping ${range(gain.modes.map(mode => mode.damping), value => significantDigits(value, 3))}`] : []),
        ...(gain.rigid.length > 0 ? [counted(gain.rigid.length, 'rigid body term')] : []),
        ...channels(inputs, outputs),
      ]
    }
    case 'measured':
      return 'points' in gain ? ['measured response', counted(gain.points.length, 'point')] : ['measured response from a file']
    case 'deadTime': return [`dead time ${gain.unit === 's' ? formatDelay(gain.deadTime) : counted(gain.deadTime, 'sample')}`]
    case 'hold': return [describeHold[gain.hold], `sampled every ${formatDelay(gain.sampleTime)}`, ...(gain.hold === 'zeroOrder' ? [] : [`duty ${gain.duty ?? 0.5}`])]
  }
}

/**
 * A block's gain in a line: the expression, or what the numbers are, as in '20 modes, 12.10 to 940.0 Hz, damping 0.003 to 0.02'.
 * Takes the engine's form or the stored one, which knows less of what stands in a file.
 */
export const describeBlockGain = (gain: BlockGain | BlockDefinition): string => partsOf(gain).join(', ')
