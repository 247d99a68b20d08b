/** Values by key, those used last kept as long as their sizes together stay within a limit; the newest is kept in any case. */
export class KeptValues<Value> {
  /** the one used longest ago first */
  readonly #entries = new Map<string, { value: Value, size: number }>()
  readonly #mostSize: number
  #size = 0

  constructor(mostSize: number) {
    this.#mostSize = mostSize
  }

  get(key: string): Value | undefined {
    const entry = this.#entries.get(key)
    if (entry === undefined) return undefined
    this.#entries.delete(key)
    this.#entries.set(key, entry)
    return entry.value
  }

  set(key: string, value: Value, size: number): void {
    this.#drop(key)
    this.#entries.set(key, { value, size })
    this.#size += size
    for (const oldest of this.#entries.keys()) {
      if (this.#size <= this.#mostSize || oldest === key) return
      this.#drop(oldest)
    }
  }

  #drop(key: string): void {
    this.#size -= this.#entries.get(key)?.size ?? 0
    this.#entries.delete(key)
  }
}
