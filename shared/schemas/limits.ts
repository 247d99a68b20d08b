/** Limits of what people type and upload, used by forms and routes. Lengths in characters. */
export const limits = {
  code: 24,
  name: 200,
  unit: 40,
  notes: 10_000,
  tags: 20,
  tag: 40,
  coordinates: 20,
  parameters: 500,
  expression: 10_000,
  email: 254,
  passwordLeast: 12,
  passwordMost: 128,
  /** coefficients, zeros or poles of one source */
  order: 200,
  /** loops, or operating conditions, of one system */
  rows: 1000,
  /** blocks of one system */
  blocks: 500,
  /** states, inputs or outputs, second-order sections and modes of one block */
  states: 200,
  channels: 50,
  sections: 100,
  modes: 200,
  /** bytes of a request that stores a block */
  blockBytes: 10_000_000,
  /** bytes of one uploaded file */
  uploadBytes: 20 * 1024 * 1024,
  /** bytes of the manifest of a system */
  manifestBytes: 60 * 1024 * 1024,
} as const
