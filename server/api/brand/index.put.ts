import { brandSchema } from '#shared/schemas/brand'
import { changeBrand } from '../../services/brand/changeBrand'

/** PUT /api/brand: replaces the fields of the brand. */
export default defineApiHandler('PUT /api/brand', { body: brandSchema }, ({ body, context }) => changeBrand(body, context))
