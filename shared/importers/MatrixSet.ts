/** State-space matrices read from a file: rows of numbers, of fitting shapes. */
export interface MatrixSet {
  /** as the file names it, or 'set 1' by its place */
  name: string
  a: number[][]
  b: number[][]
  c: number[][]
  d: number[][]
  /** names of the channels where the file has them, else [] */
  inputs: string[]
  outputs: string[]
  /** s, where the file says that the set is sampled */
  sampleTime?: number
}

export type MatrixName = 'a' | 'b' | 'c' | 'd'

/** A matrix as it stands in a file, before anything is known of its shape. */
export interface TypedMatrix {
  /** line of its heading; 0 where the file has no lines to speak of */
  line: number
  rows: { line: number, values: number[] }[]
}

/** A set of matrices as it stands in a file. */
export interface TypedSet {
  /** null where the file gives it none */
  name: string | null
  line: number
  matrices: Partial<Record<MatrixName, TypedMatrix>>
  inputs: TypedNames | null
  outputs: TypedNames | null
  sampleTime?: number
}

export interface TypedNames { line: number, names: string[] }
