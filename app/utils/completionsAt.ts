/** A name that an expression may use, as it is offered while one types. */
export interface CompletionName {
  name: string
  kind: 'block' | 'parameter'
  /** a few words beside it: 'plant, 20 modes', '0.4 s' */
  detail?: string
  /** channels of a block that has several, as they are written in G[output, input]; names, or numbers from 1 */
  outputs?: readonly string[]
  inputs?: readonly string[]
}

export interface Completion {
  text: string
  kind: 'block' | 'parameter' | 'output' | 'input'
  detail: string
}

export interface Completions {
  /** the stretch of the text that a choice takes the place of */
  from: number
  to: number
  items: Completion[]
  /** what is typed means something by itself, so that the key that ends a line must not change it */
  isWhole: boolean
}

const itself = ['s', 'z', 'pi', 'exp']
/** That many are offered at once. */
const most = 12

/**
 * What can be completed at the caret: the names that begin with what is typed there, then those that hold it; within the brackets of
 * a block the names of its outputs, after the comma of its inputs. Null where there is nothing to offer.
 *
 * @param asked by the person, who then sees every name before the first letter
 */
export function completionsAt(text: string, caret: number, names: readonly CompletionName[], asked = false): Completions | null {
  const before = text.slice(0, caret)
  const typed = /(?<![\w.])[A-Za-z_]\w*$/.exec(before)?.[0] ?? ''
  const to = caret + (/^\w*/.exec(text.slice(caret))?.[0].length ?? 0)
  const channel = channelsAt(before, names)
  if (channel === null && typed === '' && (!asked || /[\w.]$/.test(before))) return null
  const candidates: Completion[] = channel ?? names.map(({ name, kind, detail = '' }) => ({ text: name, kind, detail }))
  const found = matching(candidates, typed)
  if (found.length === 0 || (found.length === 1 && found[0]!.text === typed)) return null
  const word = text.slice(caret - typed.length, to)
  return { from: caret - typed.length, to, items: found.slice(0, most), isWhole: channel === null && (itself.includes(word) || names.some(({ name }) => name === word)) }
}

/** The channels at the caret where it stands within the brackets of a block with several. */
function channelsAt(before: string, names: readonly CompletionName[]): Completion[] | null {
  const found = /([A-Za-z_]\w*)\s*\[\s*(?:(\w+)\s*(,)\s*)?\w*$/.exec(before)
  if (found === null) return null
  const block = names.find(({ name }) => name === found[1])
  const kind = found[3] === undefined ? 'output' : 'input'
  const channels = kind === 'output' ? block?.outputs : block?.inputs
  return channels?.map(text => ({ text, kind, detail: `${kind} of ${found[1]}` })) ?? null
}

function matching(candidates: readonly Completion[], typed: string): Completion[] {
  const wanted = typed.toLowerCase()
  const places = candidates.map(candidate => ({ candidate, at: candidate.text.toLowerCase().indexOf(wanted) })).filter(({ at }) => at >= 0)
  return [...places.filter(({ at }) => at === 0), ...places.filter(({ at }) => at > 0)].map(({ candidate }) => candidate)
}
