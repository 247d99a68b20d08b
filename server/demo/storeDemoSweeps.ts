import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import type { OperatingCondition, System } from '#shared/types/system'
import type { ServiceContext } from '../services/context'
import { createSources } from '../services/sources/createSources'
import { chooseOfRecord } from '../services/sources/chooseOfRecord'
import { storeUpload } from '../services/uploads/storeUpload'
import type { DemoLoop, DemoSweep, DemoSystem } from './DemoSystem'
import { gainsIn } from './gainsIn'
import { makeSweep } from './makeSweep'
import { valuesIn } from './valuesIn'

/** Makes the sweeps of a loop, uploads each as the CSV it would have been, and makes it of record in place of the model. */
export async function storeDemoSweeps(system: System, demo: DemoSystem, loop: DemoLoop, sweep: DemoSweep, loopId: number, conditions: OperatingCondition[], context: ServiceContext): Promise<void> {
  for (const [index, condition] of conditions.entries()) {
    if (!sweep.conditionCodes.includes(condition.code)) continue
    const values = trueValues(valuesIn(demo, index), sweep)
    const gain = prepareLoopGain({ frequencyUnit: demo.frequencyUnit, expression: loop.model.definition.expression, parameters: values, blocks: gainsIn(demo, index, values) })
    const text = makeSweep({ loop: gain, frequencies: frequenciesOf(sweep, values), averages: sweep.averages, noise: sweep.noise, seed: sweep.seed + index })
    const upload = await storeUpload(system.id, { name: `${loop.code}-${condition.code}-${sweep.name.replace(' ', '')}.csv`, bytes: Buffer.from(text) }, context)
    const [source] = await createSources(loopId, {
      conditionIds: [condition.id],
      name: sweep.name,
      ofRecord: false,
      setAsideReason: 'not yet looked through',
      definition: {
        kind: 'measured',
        uploadId: upload.id,
        mapping: { frequencyColumn: 0, frequencyUnit: 'Hz', form: 'dB and degrees', firstColumn: 1, secondColumn: 2, coherenceColumn: 3, quantity: 'loopGain' },
        averages: sweep.averages,
        stayedStable: true,
        openLoopUnstablePoles: 0,
        openLoopOriginPoles: 1,
        amplitude: sweep.amplitude,
      },
    }, context)
    if (source !== undefined) await chooseOfRecord(source.id, sweep.reasonModelIsSetAside, context)
  }
}

const trueValues = (values: Record<string, number>, sweep: DemoSweep): Record<string, number> =>
  Object.fromEntries(Object.entries(values).map(([name, value]) => [name, value * (sweep.truth[name] ?? 1)]))

/** Frequencies of the sweep in Hz: evenly on a logarithmic axis, more finely where the sweep says so. */
function frequenciesOf(sweep: DemoSweep, values: Record<string, number>): number[] {
  const count = Math.ceil(Math.log10(sweep.to / sweep.from) * sweep.pointsPerDecade)
  const coarse = spaced(sweep.from, sweep.to, count)
  const fine = sweep.fine.flatMap(({ around, from, to, points }) => spaced((values[around] ?? 0) * from, (values[around] ?? 0) * to, points))
  return [...new Set([...coarse, ...fine].map(frequency => Number((frequency / (2 * Math.PI)).toPrecision(6))))].sort((a, b) => a - b)
}

const spaced = (from: number, to: number, count: number) => Array.from({ length: count + 1 }, (_, step) => from * (to / from) ** (step / count))
