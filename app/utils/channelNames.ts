/**
 * Channels as typed, separated by commas or spaces: 'torque, force'. Nothing typed, and numbers from 1 on, are channels that are only counted;
 * `names` is empty then.
 *
 * @throws RangeError naming what cannot be the name of a channel
 */
export function channelNames(text: string): { names: string[], count: number } {
  const typed = text.split(/[\s,;]+/).filter(name => name !== '')
  if (typed.every((name, index) => name === String(index + 1))) return { names: [], count: Math.max(1, typed.length) }
  for (const [index, name] of typed.entries()) {
    if (!/^[A-Za-z]\w*$/.test(name)) throw new RangeError(`'${name}' cannot be the name of a channel: a letter, then letters, digits and underscores.`)
    if (typed.indexOf(name) !== index) throw new RangeError(`'${name}' stands twice: each channel needs a name of its own.`)
  }
  return { names: typed, count: typed.length }
}
