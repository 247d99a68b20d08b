import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import type { LoopAnalysis } from '#shared/types/analysis'
import type { Criterion } from '#shared/types/criterion'
import type { ReportSnapshot, SnapshotCell } from '#shared/types/snapshot'

/**
 * L = 25 (s + 2) / (s (s + 10)) exp(-0.01 s) as a hand-made analysis, rounded: what the report lays out, not what the engine is tested on.
 * `change` replaces fields.
 */
export function buildAnalysis(change: Partial<LoopAnalysis> = {}): LoopAnalysis {
  return {
    frequencyUnit: 'rad/s',
    gainCrossovers: [{ frequency: 23.25, phaseMargin: 95.1, delayMargin: 0.0714, slope: 'falling', distance: 1.476 }],
    phaseCrossovers: [{ frequency: 163.9, gainMargin: 16.33, slope: 'falling', distance: 0.847 }],
    closestApproaches: [{ frequency: 158.2, distance: 0.846, gainChange: 16.03, phaseChange: -3.2 }],
    vectorMargin: { distance: 0.846, frequency: 158.2 },
    summary: {
      gainIncrease: 16.33, gainDecrease: null, phaseLag: 95.1, phaseLead: null, delay: 0.0714, impliedGainIncrease: 16.25, impliedGainDecrease: -5.33, impliedPhase: 50.04,
      sensitivityPeak: 1.182, complementarySensitivityPeak: 1.02,
    },
    stability: { verdict: 'stable', basis: 'counted', openLoopUnstablePoles: 0, encirclements: 0, closedLoopUnstablePoles: 0 },
    coverage: { proven: true, from: 0, to: 'infinity', exceptions: [] },
    ...change,
  }
}

export const commonCriteria: Criterion[] = [
  { quantity: 'gainMargin', limit: 6 },
  { quantity: 'phaseMargin', limit: 30 },
  { quantity: 'vectorMargin', limit: 0.5 },
  { quantity: 'delayMargin', limit: null },
]

export function buildCell(loopCode: string, conditionCode: string, analysis: LoopAnalysis | null = buildAnalysis(), change: Partial<SnapshotCell> = {}): SnapshotCell {
  const definition = { kind: 'expression', expression: '25*(s+wz)/(s*(s+10))*exp(-0.01*s)' } as const
  return {
    loopCode,
    conditionCode,
    source: analysis === null ? null : { name: 'design model', kind: 'expression', definition, file: null },
    input: analysis === null ? null : { expression: definition.expression, parameters: { wz: 2 } },
    analysis,
    failure: null,
    judgement: judgeAnalysis(analysis, commonCriteria),
    ...change,
  }
}

/** A frozen report of two loops in two conditions. `change` replaces fields. */
export function buildSnapshot(change: Partial<ReportSnapshot> = {}): ReportSnapshot {
  return {
    format: 'wideberth report snapshot',
    formatVersion: 1,
    engineVersion: '1',
    frozenAt: '2026-03-02T10:20:30.000Z',
    frozenBy: 'Mara Okafor',
    letter: 'B',
    draftNumber: 2,
    changeNote: 'Position gain lowered',
    brand: { teamName: 'Loop analysis team', accent: '#0C5A7D', addressLine: 'Quay 4, Havnby', pageSize: 'A4', mark: null },
    system: { name: 'Tern 30 access gangway', customer: 'Norrhavn Offshore', documentNumber: 'WB-0042', frequencyUnit: 'rad/s', description: 'An access gangway.' },
    report: { title: 'Stability margins of all axes', documentNumber: 'WB-0042', remarks: 'Every axis is looked at in **two** conditions.' },
    criteria: commonCriteria,
    conditions: [
      { code: 'C1', name: 'Retracted', coordinates: [{ name: 'stroke', unit: 'm', value: 18 }], tags: ['calm'], notes: '' },
      { code: 'C2', name: 'Extended', coordinates: [{ name: 'stroke', unit: 'm', value: 30 }], tags: [], notes: 'Warm oil.' },
    ],
    loops: [
      { code: 'SL-R', name: 'Slew rate', axis: 'slew', breakPoint: 'valve command', otherLoops: 'slew position open', notes: '', remarks: '' },
      { code: 'SL-P', name: 'Slew position', axis: 'slew', breakPoint: 'rate command', otherLoops: 'slew rate closed', notes: '', remarks: 'Governs.' },
    ],
    parameters: [{ name: 'wz', unit: 'rad/s', notes: 'zero', values: { C1: 2, C2: 2 } }],
    cells: ['SL-R', 'SL-P'].flatMap(loop => ['C1', 'C2'].map(condition => buildCell(loop, condition))),
    history: [{ letter: 'A', changeNote: 'First issue', frozenBy: 'Mara Okafor', issuedBy: 'Ines Duval', issuedAt: '2026-01-12T09:00:00.000Z' }],
    ...change,
  }
}
