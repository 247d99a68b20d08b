import type { Migration } from '../Migration'
import { organisationAndPeople } from './20261201-01-organisation-and-people'
import { systems } from './20261201-02-systems'
import { sources } from './20261201-03-sources'
import { reports } from './20261201-04-reports'
import { audit } from './20261201-05-audit'
import { blocks } from './20261201-06-blocks'

/** Every migration in order, as an imported list: the built server has no source folder to search. */
export const migrations: readonly Migration[] = [organisationAndPeople, systems, sources, reports, audit, blocks]
