import PQueue from 'p-queue'
import { RateLimiterMemory } from 'rate-limiter-flexible'
import { AppError } from '#shared/errors/AppError'

/** s; failures are forgotten this long after the last */
const memory = 3600
/** s; the longest wait: long enough to make guessing hopeless, short enough that nobody is locked out for good */
const longestWait = 300

/** Some tries are free; after each further one the next must wait twice as long as before it: 1, 2, 4 ... 300 s. */
export class SignInLimiter {
  readonly #tries: RateLimiterMemory
  readonly #waits: RateLimiterMemory
  readonly #freeTries: number
  readonly #steps = new PQueue({ concurrency: 1 })

  constructor(freeTries: number) {
    this.#freeTries = freeTries
    this.#tries = new RateLimiterMemory({ points: Number.MAX_SAFE_INTEGER, duration: memory })
    this.#waits = new RateLimiterMemory({ points: 1, duration: memory })
  }

  /** Throws 'too many tries' with the wait in words while this key must wait. */
  async assertMayTry(key: string): Promise<void> {
    const wait = await this.#waits.get(key)
    if (wait === null || wait.msBeforeNext <= 0) return
    const waitSeconds = Math.ceil(wait.msBeforeNext / 1000)
    throw new AppError('tooManyTries', `Too many tries. Wait ${waitSeconds} ${waitSeconds === 1 ? 'second' : 'seconds'} and try again.`, { details: { waitSeconds } })
  }

  /** Counts a try; with those before it, it may make the next one wait. */
  async count(key: string): Promise<void> {
    const { consumedPoints } = await this.#tries.penalty(key)
    const over = consumedPoints - this.#freeTries
    if (over >= 0) await this.#waits.block(key, Math.min(longestWait, 2 ** over))
  }

  /** Both in one step, so that of many tries sent at once only the free ones get through. */
  take(key: string): Promise<void> {
    return this.#steps.add(async () => {
      await this.assertMayTry(key)
      await this.count(key)
    })
  }

  /** Forgets the tries of a key that has shown to be in order. */
  async forget(key: string): Promise<void> {
    await this.#tries.delete(key)
    await this.#waits.delete(key)
  }
}
