import { describe, expect, it } from 'vitest'
import { freezeObstacles } from '#shared/workflow/freezeObstacles'
import { issueObstacles } from '#shared/workflow/issueObstacles'
import type { IssueFacts } from '#shared/workflow/issueObstacles'
import { nextDraft } from '#shared/workflow/nextDraft'
import { revisionLabel } from '#shared/workflow/revisionLabel'

const ready: IssueFacts = { state: 'draft', letter: 'B', letterIsIssued: false, hasNewerDraft: false, isOwnWork: false, draftArtefacts: ['html', 'pdf', 'zip'], unproven: [], isBeingIssued: false }
const obstacles = (change: Partial<IssueFacts>) => issueObstacles({ ...ready, ...change })

describe('what stands against issuing a draft', () => {
  it('is nothing when all is ready', () => {
    expect(obstacles({})).toEqual([])
  })

  it.each(['issued', 'superseded', 'withdrawn'] as const)('is, of a revision that is %s, that alone', (state) => {
    expect(obstacles({ state, isOwnWork: true, draftArtefacts: [] })).toEqual([`This revision is ${state} already.`])
  })

  it('is named all at once, so that nobody mends one to meet the next', () => {
    expect(obstacles({ letterIsIssued: true, hasNewerDraft: true, isOwnWork: true, draftArtefacts: ['html'], isBeingIssued: true, unproven: [{ loopCode: 'L', conditionCode: 'C' }] })).toHaveLength(6)
  })

  it('names five unproven pairs and counts the rest', () => {
    const unproven = Array.from({ length: 7 }, (_, index) => ({ loopCode: `L${index}`, conditionCode: 'C1' }))
    expect(obstacles({ unproven })[0]).toBe('Not proven: L0 in C1, L1 in C1, L2 in C1, L3 in C1, L4 in C1 and 2 more. A report is issued only when every list of crossings of a model is proven.')
  })
})

describe('what stands against freezing a report', () => {
  it('is that it covers nothing', () => {
    expect(freezeObstacles({ loops: [], conditions: [] })).toHaveLength(2)
  })

  it('takes a blank break point for none', () => {
    expect(freezeObstacles({ loops: [{ code: 'SL-P', breakPoint: ' \n' }], conditions: [{}] })).toEqual(['SL-P does not say at which signal it is opened: state its break point.'])
  })

  it('is that break points of one closed system contradict one another, told at both', () => {
    const loops = [{ code: 'SL-P', breakPoint: 'command' }]
    expect(freezeObstacles({ loops, conditions: [{}], disagreements: [{ loopCode: 'SL-P', conditionCode: 'C1', words: 'Opened here it is stable.' }] })).toEqual(['SL-P in C1: Opened here it is stable.'])
  })
})

describe('the next draft', () => {
  const revision = (letter: string, draftNumber: number, state: 'draft' | 'issued' | 'superseded' | 'withdrawn') => ({ letter, draftNumber, state })

  it('is A draft 1 of a report without revisions', () => {
    expect(nextDraft([])).toEqual({ letter: 'A', draftNumber: 1 })
  })

  it('counts on within a letter that is not issued', () => {
    expect(nextDraft([revision('A', 1, 'draft'), revision('A', 2, 'draft')])).toEqual({ letter: 'A', draftNumber: 3 })
  })

  it('takes the letter after the newest issued one, also when that was withdrawn, and never I (ASME Y14.35)', () => {
    expect(nextDraft([revision('A', 3, 'superseded'), revision('H', 1, 'withdrawn')])).toEqual({ letter: 'J', draftNumber: 1 })
  })

  it('takes AA for newer than Y', () => {
    expect(nextDraft([revision('Y', 1, 'superseded'), revision('AA', 1, 'issued'), revision('B', 1, 'superseded')])).toEqual({ letter: 'AB', draftNumber: 1 })
  })
})

describe('the label of a revision', () => {
  it('tells a draft from what was issued', () => {
    expect([revisionLabel({ letter: 'A', draftNumber: 2, state: 'draft' }), revisionLabel({ letter: 'A', draftNumber: 2, state: 'superseded' })]).toEqual(['A draft 2', 'A'])
  })
})
