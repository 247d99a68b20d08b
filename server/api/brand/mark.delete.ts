import { removeMark } from '../../services/brand/storeMark'

/** DELETE /api/brand/mark: takes the mark away. */
export default defineApiHandler('DELETE /api/brand/mark', {}, ({ context }) => removeMark(context))
