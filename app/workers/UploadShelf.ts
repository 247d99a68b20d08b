import type { MatrixSet } from '#shared/importers/MatrixSet'
import type { MeasurementProblem } from '#shared/importers/MeasurementProblem'
import { previewMeasurement, type MeasurementPreview } from '#shared/importers/previewMeasurement'
import { readMatrices, type MatrixReading } from '#shared/importers/readMatrices'
import { readMeasurement } from '#shared/importers/readMeasurement'
import type { MeasuredPoint } from '#shared/types/analysis'
import type { BlockDefinition } from '#shared/types/block'

/** The uploaded files that definitions of blocks name, kept in the worker as text, since they may be large, and read once for each way of reading. */
export class UploadShelf {
  private readonly texts = new Map<number, string>()
  private readonly readings = new Map<string, unknown>()

  keep(id: number, text: string): void {
    this.texts.set(id, text)
  }

  has(id: number): boolean {
    return this.texts.has(id)
  }

  matrices(id: number, states: number | null): MatrixReading {
    return this.once(`${id} matrices ${states}`, () => readMatrices(this.textOf(id), { states }))
  }

  isJson(id: number): boolean {
    return /^\s*[[{]/.test(this.textOf(id))
  }

  preview(id: number): MeasurementPreview {
    return this.once(`${id} preview`, () => previewMeasurement(this.textOf(id)))
  }

  /** What a definition needs of its file; `problems` where a row of a measured response is wrong. */
  factsOf(definition: BlockDefinition): { sets?: MatrixSet[], points?: MeasuredPoint[], problems?: MeasurementProblem[] } {
    if (definition.kind === 'stateSpace') return { sets: this.matrices(definition.uploadId, definition.states).sets }
    if (definition.kind !== 'measured') return {}
    const { points, problems } = this.once(`${definition.uploadId} ${JSON.stringify(definition.mapping)}`, () => readMeasurement(this.textOf(definition.uploadId), definition.mapping))
    return problems.length > 0 ? { points: [], problems } : { points }
  }

  private textOf(id: number): string {
    return this.texts.get(id) ?? ''
  }

  private once<Reading>(key: string, read: () => Reading): Reading {
    if (!this.readings.has(key)) this.readings.set(key, read())
    return this.readings.get(key) as Reading
  }
}
