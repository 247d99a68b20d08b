/**
 * Thrown by the analysis when an input cannot be analysed.
 * `path` names the field at fault as in 'denominator' or 'measured.points[3].coherence'; `position` is the
 * character (from 0) in an expression where the fault stands, when it has one.
 */
export class AnalysisInputError extends Error {
  readonly path: string
  readonly position: number | undefined

  constructor(message: string, path: string, position?: number) {
    super(message)
    this.name = 'AnalysisInputError'
    this.path = path
    this.position = position
  }
}
