import type { FigureCurve } from '../FigureData'
import type { CurveViews } from './curveViews'
import { curveViews } from './curveViews'
import { valueOfView } from './valueOfView'

/**
 * The views of several curves with the phases of all brought into the turn of the first: a sweep that begins in the middle of the band knows the turn it begins
 * in no better than by its slope. Each curve is moved by the whole turns that lie nearest to the middle of its differences.
 */
export function alignedViews(curves: readonly FigureCurve[]): CurveViews[] {
  const views = curves.map(({ curve }) => curveViews(curve))
  const [main, reference] = [curves[0], views[0]]
  if (main === undefined || reference === undefined) return views
  return views.map((view, index) => {
    if (index === 0) return view
    const { frequency } = curves[index]!.curve
    const differences: number[] = []
    frequency.forEach((at, i) => {
      const there = valueOfView(main.curve, reference.phase, at)
      if (there !== null && !Number.isNaN(view.phase[i]!)) differences.push(there - view.phase[i]!)
    })
    if (differences.length === 0) return view
    differences.sort((a, b) => a - b)
    const turns = Math.round(differences[differences.length >> 1]! / 360)
    return turns === 0 ? view : { ...view, phase: view.phase.map(phase => phase + 360 * turns) }
  })
}
