/** One step of the schema: hand-written SQL that runs once, in a transaction of its own. Never edited after it has shipped. */
export interface Migration {
  name: string
  sql: string
}
