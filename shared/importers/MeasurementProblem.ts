/** What is wrong in an uploaded file. */
export interface MeasurementProblem {
  /** line of the file, counted from 1; 0 for the file as a whole */
  line: number
  message: string
}
