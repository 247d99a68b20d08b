import { blockEffectsSchema } from '#shared/schemas/block'
import { limits } from '#shared/schemas/limits'
import { readBlockEffects } from '../../../../services/blocks/readBlockEffects'

/** POST /api/systems/[systemId]/blocks/effects: what the draft of a block would move; nothing is stored. */
export default defineApiHandler('POST /api/systems/[systemId]/blocks/effects', { body: blockEffectsSchema, bodyLimit: limits.blockBytes }, ({ params, body, context }) => readBlockEffects(params.systemId, body, context))
