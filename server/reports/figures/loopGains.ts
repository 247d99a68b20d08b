import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import { approximateLoopGain } from '#shared/analysis/sampling/approximateLoopGain'
import type { DrawOptions } from './drawReportFigures'

/** The engine's loop gains, as the figures of a report ask for them. */
export const loopGains: Pick<DrawOptions, 'prepareGain' | 'approximateGain'> = {
  prepareGain: prepareLoopGain,
  approximateGain: input => ('expression' in input ? approximateLoopGain(input) : null),
}
