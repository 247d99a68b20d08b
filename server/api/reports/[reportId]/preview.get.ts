import { documentPolicy } from '../../../http/documentPolicy'
import { reportRenderer } from '../../../reports/reportRenderer'
import { previewReport } from '../../../services/reports/previewReport'

/** GET /api/reports/[reportId]/preview: the document as it would be frozen now, as a page of its own. */
export default defineApiHandler('GET /api/reports/[reportId]/preview', {}, async ({ event, params, context }) => {
  const html = await previewReport(params.reportId, await reportRenderer(), context)
  setResponseHeaders(event, { 'content-type': 'text/html; charset=utf-8', 'content-security-policy': documentPolicy, 'x-content-type-options': 'nosniff' })
  return html
})
