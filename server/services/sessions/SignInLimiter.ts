import { RateLimiterMemory } from 'rate-limiter-flexible'
import { AppError } from '#shared/errors/AppError'

/** Failures are forgotten an hour after the last. */
const memory = 3600
/** s; the longest wait: long enough to make guessing hopeless, short enough that nobody is locked out for good */
const longestWait = 300

/** Five tries are free; after each further failure the next try must wait twice as long as before it: 1, 2, 4 ... 300 s. */
export class SignInLimiter {
  readonly #failures: RateLimiterMemory
  readonly #waits: RateLimiterMemory
  readonly #freeTries: number

  constructor(freeTries = 5) {
    this.#freeTries = freeTries
    this.#failures = new RateLimiterMemory({ points: Number.MAX_SAFE_INTEGER, duration: memory })
    this.#waits = new RateLimiterMemory({ points: 1, duration: memory })
  }

  /** Throws 'too many tries' with the wait in words while this key must wait. */
  async assertMayTry(key: string): Promise<void> {
    const wait = await this.#waits.get(key)
    if (wait === null || wait.msBeforeNext <= 0) return
    const waitSeconds = Math.ceil(wait.msBeforeNext / 1000)
    throw new AppError('tooManyTries', `Too many tries. Wait ${waitSeconds} ${waitSeconds === 1 ? 'second' : 'seconds'} and try again.`, { details: { waitSeconds } })
  }

  async noteFailure(key: string): Promise<void> {
    const { consumedPoints } = await this.#failures.penalty(key)
    const over = consumedPoints - this.#freeTries
    if (over >= 0) await this.#waits.block(key, Math.min(longestWait, 2 ** over))
  }

  async noteSuccess(key: string): Promise<void> {
    await this.#failures.delete(key)
    await this.#waits.delete(key)
  }
}
