import { parseNumberText } from '~/utils/parseNumberText'
import { parseTimeText } from '~/utils/parseTimeText'
import type { TypedProblem } from './TypedSource'

/** Reads texts of fields, and collects what is wrong with each by its path. */
export class FieldReader {
  readonly problems: TypedProblem[] = []

  /** What `parse` makes of it; a failure is a problem of that path. */
  read<Value>(path: string, parse: () => Value, fallback: Value): Value {
    try {
      return parse()
    }
    catch (error) {
      this.fault(path, error instanceof Error ? error.message : String(error))
      return fallback
    }
  }

  fault(path: string, message: string): void {
    this.problems.push({ path, message })
  }

  /** A number that may be left out; `check` says what is wrong with its value. */
  optional(path: string, text: string, check?: (value: number) => string | null, place = ''): number | undefined {
    return this.valueOf(path, text, parseNumberText, `${place}'${text.trim()}' is not a number. Write it like 12.5 or 1.2e3.`, check)
  }

  /** A number that must be there; 0 stands in for it while it is not. `place` stands before what is told of one among many. */
  required(path: string, text: string, what: string, check?: (value: number) => string | null, place = ''): number {
    if (text.trim() === '') this.fault(path, `Type ${what}.`)
    return this.optional(path, text, check, place) ?? 0
  }

  /** A time in seconds, typed with a unit or without. */
  optionalTime(path: string, text: string, check?: (value: number) => string | null): number | undefined {
    return this.valueOf(path, text, parseTimeText, `'${text.trim()}' is not a time. Write it like 0.02, 20 ms or 20 us.`, check)
  }

  requiredTime(path: string, text: string, what: string, check?: (value: number) => string | null): number {
    if (text.trim() === '') this.fault(path, `Type ${what}.`)
    return this.optionalTime(path, text, check) ?? 0
  }

  private valueOf(path: string, text: string, parse: (text: string) => number | null, unreadable: string, check?: (value: number) => string | null): number | undefined {
    const value = parse(text)
    if (value === null) return undefined
    const fault = Number.isNaN(value) ? unreadable : check?.(value) ?? null
    if (fault === null) return value
    this.fault(path, fault)
    return undefined
  }
}
