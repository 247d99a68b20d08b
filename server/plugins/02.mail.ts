import { logger } from '../log/logger'
import { deliverOutbox } from '../mail/deliverOutbox'

/** ms between two rounds for mails that could not be sent at once */
const betweenRounds = 5 * 60_000

/** Sends again what the mail server would not take. */
export default defineNitroPlugin((nitro) => {
  if (!process.env.WIDEBERTH_SMTP_URL) return
  const timer = setInterval(() => {
    deliverOutbox(() => new Date()).catch((error: unknown) => logger.error({ err: error }, 'The outbox could not be sent.'))
  }, betweenRounds)
  timer.unref()
  nitro.hooks.hook('close', () => clearInterval(timer))
})
