import type { MeasurementMapping, SourceDefinition, SourceKind, Upload } from '#shared/types/source'
import { parseNumberList } from '~/utils/parseNumberList'
import { parseNumberText } from '~/utils/parseNumberText'
import { parseRoots } from '~/utils/parseRoots'
import { rootsAsText } from '~/utils/rootsAsText'

/** A source as it stands in the editor: every field of every kind is a text, so that nothing typed is lost by changing the kind. */
export interface TypedSource {
  kind: SourceKind
  name: string
  numerator: string
  denominator: string
  zeros: string
  poles: string
  gain: string
  expression: string
  deadTime: string
  /** in z, with the sample time */
  sampled: boolean
  sampleTime: string
  upload: Upload | null
  mapping: MeasurementMapping | null
  averages: string
  stayed: 'stable' | 'unstable' | 'not known'
  unstablePoles: string
  originPoles: string
  amplitude: string
}

export interface TypedProblem {
  /** path as the engine and the API name it: 'numerator', 'deadTime' */
  path: string
  message: string
}

export const emptySource = (): TypedSource => ({
  kind: 'expression', name: 'design model', numerator: '', denominator: '', zeros: '', poles: '', gain: '', expression: '', deadTime: '', sampled: false, sampleTime: '',
  upload: null, mapping: null, averages: '', stayed: 'not known', unstablePoles: '', originPoles: '', amplitude: '',
})

const asText = (value: number | undefined) => value === undefined ? '' : String(value)

/** The texts of a stored source. */
export function typedSource(name: string, definition: SourceDefinition): TypedSource {
  const common = { ...emptySource(), name, kind: definition.kind }
  if (definition.kind === 'measured') {
    return {
      ...common, mapping: definition.mapping, averages: asText(definition.averages), unstablePoles: asText(definition.openLoopUnstablePoles),
      originPoles: asText(definition.openLoopOriginPoles), amplitude: definition.amplitude ?? '',
      stayed: definition.stayedStable === undefined ? 'not known' : definition.stayedStable ? 'stable' : 'unstable',
    }
  }
  const timed = { ...common, deadTime: asText(definition.deadTime), sampled: definition.sampleTime !== undefined, sampleTime: asText(definition.sampleTime) }
  if (definition.kind === 'expression') return { ...timed, expression: definition.expression }
  if (definition.kind === 'coefficients') return { ...timed, numerator: definition.numerator.join(' '), denominator: definition.denominator.join(' ') }
  return { ...timed, zeros: rootsAsText(definition.zeros), poles: rootsAsText(definition.poles), gain: String(definition.gain) }
}

/** The definition that was typed, or every field that cannot be read. `uploadId` is that of a measured response's file, 0 while it is not stored yet. */
export function readTypedSource(typed: TypedSource, uploadId = typed.upload?.id ?? 0): { definition: SourceDefinition } | { problems: TypedProblem[] } {
  const problems: TypedProblem[] = []

  function read<Value>(path: string, parse: () => Value, fallback: Value): Value {
    try {
      return parse()
    }
    catch (error) {
      problems.push({ path, message: error instanceof Error ? error.message : String(error) })
      return fallback
    }
  }
  const number = (path: string, text: string, check: (value: number) => string | null): number | undefined => read(path, () => {
    const value = parseNumberText(text)
    if (value === null) return undefined
    const fault = Number.isNaN(value) ? `'${text.trim()}' is not a number. Write it like 12.5 or 1.2e3.` : check(value)
    if (fault !== null) throw new RangeError(fault)
    return value
  }, undefined)
  const given = (name: string, value: number | undefined) => value === undefined ? {} : { [name]: value }
  const needed = (path: string, message: string) => void problems.push({ path, message })

  const definition = typed.kind === 'measured' ? readMeasured() : readModel(typed.kind)
  return problems.length > 0 || definition === null ? { problems } : { definition }

  function readModel(kind: 'coefficients' | 'zerosPoles' | 'expression'): SourceDefinition {
    const deadTime = number('deadTime', typed.deadTime, value => value < 0 ? 'Dead time is in seconds and not negative.' : null)
    const sampleTime = typed.sampled ? number('sampleTime', typed.sampleTime, value => value > 0 ? null : 'The sample time is in seconds and above zero.') : undefined
    if (typed.sampled && typed.sampleTime.trim() === '') needed('sampleTime', 'A loop in z needs its sample time.')
    const timing = { ...given('deadTime', deadTime), ...given('sampleTime', sampleTime) }
    if (kind === 'expression') {
      if (typed.expression.trim() === '') needed('expression', 'Type the loop gain L.')
      return { kind, expression: typed.expression, ...timing }
    }
    if (kind === 'coefficients') {
      const numerator = read('numerator', () => parseNumberList(typed.numerator), [])
      const denominator = read('denominator', () => parseNumberList(typed.denominator), [])
      if (typed.numerator.trim() === '') needed('numerator', 'Type the coefficients, highest power first.')
      if (typed.denominator.trim() === '') needed('denominator', 'Type the coefficients, highest power first.')
      return { kind, numerator, denominator, ...timing }
    }
    const zeros = read('zeros', () => parseRoots(typed.zeros), [])
    const poles = read('poles', () => parseRoots(typed.poles), [])
    const gain = number('gain', typed.gain, () => null)
    if (typed.gain.trim() === '') needed('gain', 'Type the gain: the factor before the products of (s - zero) and (s - pole).')
    return { kind, zeros, poles, gain: gain ?? 0, ...timing }
  }

  function readMeasured(): SourceDefinition | null {
    const whole = (value: number) => Number.isInteger(value) && value >= 0 ? null : 'This is a whole number, zero or above.'
    const averages = number('averages', typed.averages, value => Number.isInteger(value) && value > 0 ? null : 'This is a whole number above zero.')
    const openLoopUnstablePoles = number('openLoopUnstablePoles', typed.unstablePoles, whole)
    const openLoopOriginPoles = number('openLoopOriginPoles', typed.originPoles, whole)
    if (typed.mapping === null) {
      needed('mapping', 'Choose a file and say what its columns are.')
      return null
    }
    const amplitude = typed.amplitude.trim()
    return {
      kind: 'measured', uploadId, mapping: typed.mapping,
      ...given('averages', averages), ...given('openLoopUnstablePoles', openLoopUnstablePoles), ...given('openLoopOriginPoles', openLoopOriginPoles),
      ...typed.stayed !== 'not known' && { stayedStable: typed.stayed === 'stable' },
      ...amplitude !== '' && { amplitude },
    }
  }
}
