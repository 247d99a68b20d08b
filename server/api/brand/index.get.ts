import { readBrand } from '../../services/brand/readBrand'

/** GET /api/brand: the team's brand. */
export default defineApiHandler('GET /api/brand', {}, () => readBrand())
