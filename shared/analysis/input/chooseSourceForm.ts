import { AnalysisInputError } from '../AnalysisInputError'
import { isGiven } from './isGiven'
import { commonFields, contractFields, sourceForms, type SourceForm } from './sourceForms'

/** Names people write for a field of the contract: read over silently they would give a wrong number. */
const misnamed: Record<string, string> = {
  num: 'numerator', den: 'denominator', delay: 'deadTime', timedelay: 'deadTime', ts: 'sampleTime', sampletime: 'sampleTime',
  samplingtime: 'sampleTime', k: 'gain', floor: 'gainFloor', unit: 'frequencyUnit', points: 'measured',
}

const bare = (name: string) => name.toLowerCase().replace(/[^a-z]/g, '')

/**
 * The one source form in which a loop is given.
 *
 * Fields the contract does not know are left alone, unless they look like one it knows ('dead_time', 'Ts'):
 * such a field is an error, for a loop analysed without it would be another loop.
 * @throws AnalysisInputError where no form is complete, two are mixed, or a field belongs to another form.
 */
export function chooseSourceForm(record: Record<string, unknown>): SourceForm {
  refuseMisnamedFields(record)
  const begun = sourceForms.filter(form => form.key.some(field => isGiven(record[field])))
  const form = begun[0]
  if (form === undefined) {
    throw new AnalysisInputError(
      'The loop has no source: give numerator and denominator; or zeros, poles and gain; or an expression; or a measured response.', '')
  }
  const second = begun[1]
  if (second !== undefined) {
    const field = second.key.find(name => isGiven(record[name])) ?? second.key[0]
    throw new AnalysisInputError(`The loop is given both as ${form.name} and as ${second.name}: leave one of them out.`, field)
  }
  const missing = form.key.find(field => !isGiven(record[field]))
  if (missing !== undefined) {
    throw new AnalysisInputError(`A loop given as ${form.name} needs ${form.key.join(', ')}: ${missing} is missing.`, missing)
  }
  const own: readonly string[] = [...commonFields, ...form.key, ...form.other]
  // A dead time of 0 is none, whatever the form.
  const stranger = contractFields.find(field => isGiven(record[field]) && !own.includes(field) && !(field === 'deadTime' && record[field] === 0))
  if (stranger !== undefined) {
    throw new AnalysisInputError(`${stranger} does not go with ${form.name}${hintFor(stranger, form.name)}.`, stranger)
  }
  return form
}

function hintFor(field: string, form: string): string {
  if (field === 'deadTime' && form === 'an expression') return ': write the dead time as a factor exp(-s*T)'
  return field === 'deadTime' || field === 'sampleTime' ? ': it is already in the measured response' : ''
}

function refuseMisnamedFields(record: Record<string, unknown>): void {
  for (const field of Object.keys(record)) {
    if (contractFields.includes(field) || !isGiven(record[field])) continue
    const plain = bare(field)
    const meant = contractFields.find(known => bare(known) === plain) ?? (Object.hasOwn(misnamed, plain) ? misnamed[plain] : undefined)
    if (meant !== undefined) {
      throw new AnalysisInputError(`${field.slice(0, 40)} is not a field of a loop: write ${meant}.`, field.slice(0, 40))
    }
  }
}
