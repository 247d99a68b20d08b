import type { Action } from './rules'

/**
 * The action each API route needs; `defineApiHandler` takes its key, so that a route without a rule does not compile,
 * and a test compares the keys with the files under server/api.
 * Routes under 'read issued revisions' answer drafts only to those who may 'see loops, data and drafts'; to a customer a draft is not found.
 */
export const routeActions = {
  'GET /api/health': 'use the sign-in pages',

  'GET /api/auth/session': 'use own session',
  'POST /api/auth/sign-in': 'use the sign-in pages',
  'POST /api/auth/sign-out': 'use own session',
  'GET /api/auth/set-up': 'use the sign-in pages',
  'POST /api/auth/set-up': 'use the sign-in pages',
  'POST /api/auth/reset-request': 'use the sign-in pages',
  'POST /api/auth/password': 'use the sign-in pages',

  'GET /api/people': 'manage people',
  'POST /api/people': 'manage people',
  'PATCH /api/people/[personId]': 'manage people',
  'POST /api/people/[personId]/invitation': 'manage people',
  'GET /api/outbox': 'read the outbox',
  'GET /api/brand': 'read the brand',
  'PUT /api/brand': 'change the brand',
  'GET /api/brand/mark': 'read the brand',
  'PUT /api/brand/mark': 'change the brand',
  'DELETE /api/brand/mark': 'change the brand',

  'POST /api/analyses': 'analyse an input',

  'GET /api/systems': 'list own systems',
  'POST /api/systems': 'create a system',
  'POST /api/manifests': 'create a system',
  'GET /api/systems/[systemId]': 'see loops, data and drafts',
  'PATCH /api/systems/[systemId]': 'change loops, criteria and drafts',
  'DELETE /api/systems/[systemId]': 'change loops, criteria and drafts',
  'POST /api/systems/[systemId]/restore': 'change loops, criteria and drafts',
  'POST /api/systems/[systemId]/copy': 'change loops, criteria and drafts',
  'GET /api/systems/[systemId]/manifest': 'see loops, data and drafts',
  'GET /api/systems/[systemId]/board': 'see loops, data and drafts',
  'PUT /api/systems/[systemId]/criteria': 'change loops, criteria and drafts',
  'GET /api/systems/[systemId]/members': 'see loops, data and drafts',
  'PUT /api/systems/[systemId]/members': 'manage members',
  'POST /api/systems/[systemId]/loops': 'change loops, criteria and drafts',
  'PUT /api/systems/[systemId]/loops/order': 'change loops, criteria and drafts',
  'POST /api/systems/[systemId]/conditions': 'change loops, criteria and drafts',
  'PUT /api/systems/[systemId]/conditions/order': 'change loops, criteria and drafts',
  'GET /api/systems/[systemId]/parameters': 'see loops, data and drafts',
  'PUT /api/systems/[systemId]/parameters': 'change loops, criteria and drafts',
  'GET /api/systems/[systemId]/blocks': 'see loops, data and drafts',
  'POST /api/systems/[systemId]/blocks': 'change loops, criteria and drafts',
  'PUT /api/systems/[systemId]/blocks/order': 'change loops, criteria and drafts',
  'POST /api/systems/[systemId]/blocks/effects': 'change loops, criteria and drafts',
  'POST /api/systems/[systemId]/matrices': 'change loops, criteria and drafts',
  'POST /api/systems/[systemId]/uploads': 'change loops, criteria and drafts',
  'GET /api/systems/[systemId]/reports': 'read issued revisions',
  'POST /api/systems/[systemId]/reports': 'change loops, criteria and drafts',

  'GET /api/loops/[loopId]': 'see loops, data and drafts',
  'PATCH /api/loops/[loopId]': 'change loops, criteria and drafts',
  'DELETE /api/loops/[loopId]': 'change loops, criteria and drafts',
  'POST /api/loops/[loopId]/restore': 'change loops, criteria and drafts',
  'POST /api/loops/[loopId]/copy': 'change loops, criteria and drafts',
  'GET /api/loops/[loopId]/conditions/[conditionId]/sources': 'see loops, data and drafts',
  'POST /api/loops/[loopId]/sources': 'change loops, criteria and drafts',

  'GET /api/conditions/[conditionId]/gains': 'see loops, data and drafts',
  'PATCH /api/conditions/[conditionId]': 'change loops, criteria and drafts',
  'DELETE /api/conditions/[conditionId]': 'change loops, criteria and drafts',
  'POST /api/conditions/[conditionId]/restore': 'change loops, criteria and drafts',
  'POST /api/conditions/[conditionId]/copy': 'change loops, criteria and drafts',

  'PATCH /api/blocks/[blockId]': 'change loops, criteria and drafts',
  'DELETE /api/blocks/[blockId]': 'change loops, criteria and drafts',
  'POST /api/blocks/[blockId]/restore': 'change loops, criteria and drafts',

  'GET /api/sources/[sourceId]': 'see loops, data and drafts',
  'PUT /api/sources/[sourceId]': 'change loops, criteria and drafts',
  'DELETE /api/sources/[sourceId]': 'change loops, criteria and drafts',
  'POST /api/sources/[sourceId]/restore': 'change loops, criteria and drafts',
  'POST /api/sources/[sourceId]/of-record': 'change loops, criteria and drafts',
  'GET /api/uploads/[uploadId]': 'see loops, data and drafts',

  'GET /api/reports/[reportId]': 'read issued revisions',
  'PATCH /api/reports/[reportId]': 'change loops, criteria and drafts',
  'DELETE /api/reports/[reportId]': 'change loops, criteria and drafts',
  'POST /api/reports/[reportId]/restore': 'change loops, criteria and drafts',
  'GET /api/reports/[reportId]/preview': 'see loops, data and drafts',
  'POST /api/reports/[reportId]/revisions': 'freeze a revision',

  'GET /api/revisions/[revisionId]': 'read issued revisions',
  'GET /api/revisions/[revisionId]/artefacts/[kind]': 'read issued revisions',
  'GET /api/revisions/[revisionId]/comparison/[otherId]': 'read issued revisions',
  'POST /api/revisions/[revisionId]/render': 'freeze a revision',
  'POST /api/revisions/[revisionId]/issue': 'issue a revision',

  'GET /api/jobs/[jobId]': 'see loops, data and drafts',
  'GET /api/jobs/[jobId]/events': 'see loops, data and drafts',
  'POST /api/jobs/[jobId]/cancel': 'cancel a rendering',
} as const satisfies Record<string, Action>

export type RouteKey = keyof typeof routeActions
