import { listOutbox } from '../../services/mails/listOutbox'

/** GET /api/outbox: the mails sent and waiting, newest first. */
export default defineApiHandler('GET /api/outbox', {}, () => listOutbox())
