import { join, resolve } from 'node:path'

/** The one folder all data live in: WIDEBERTH_DATA, or .data where the server was started. */
export const dataFolder = (environment: NodeJS.ProcessEnv = process.env): string => resolve(environment.WIDEBERTH_DATA || '.data')

/** The SQLite file in the data folder. */
export const databaseFile = (environment: NodeJS.ProcessEnv = process.env): string => join(dataFolder(environment), 'wideberth.sqlite')
