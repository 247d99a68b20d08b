import { listSystems } from '../../services/systems/listSystems'

/** GET /api/systems: the systems of the person, with its roles in each. */
export default defineApiHandler('GET /api/systems', {}, ({ context }) => listSystems(context))
