import { listPeople } from '../../services/people/listPeople'

/** GET /api/people: every account. */
export default defineApiHandler('GET /api/people', {}, () => listPeople())
