import type { BlockResponseData, CrossingChartData, LoopFigureData } from './FigureData'
import type { DrawFigure } from './Figure'
import { captionOfBerthChart } from './captions/captionOfBerthChart'
import { captionOfBlockResponse } from './captions/captionOfBlockResponse'
import { captionOfCrossingChart } from './captions/captionOfCrossingChart'
import { captionOfGainOverPhase } from './captions/captionOfGainOverPhase'
import { captionOfMagnitudePhase } from './captions/captionOfMagnitudePhase'
import { captionOfReturnDifferenceProfile } from './captions/captionOfReturnDifferenceProfile'
import { drawBerthChart } from './figures/berthChart'
import { drawBlockResponse } from './figures/blockResponse'
import { drawCrossingChart } from './figures/crossingChart'
import { drawGainOverPhase } from './figures/gainOverPhase'
import { drawMagnitudePhase } from './figures/magnitudePhase'
import { drawReturnDifferenceProfile } from './figures/returnDifferenceProfile'

/** The data that each figure draws. */
export interface FigureDataOf {
  crossingChart: CrossingChartData
  berthChart: LoopFigureData
  returnDifferenceProfile: LoopFigureData
  magnitudePhase: LoopFigureData
  gainOverPhase: LoopFigureData
  blockResponse: BlockResponseData
}

export type FigureName = keyof FigureDataOf

export interface FigureDefinition<Data> {
  /** its heading */
  title: string
  draw: DrawFigure<Data>
  /** what there is to see in it, in words */
  caption: (data: Data) => string
}

/** Every figure by name. A new one is a file in `figures/`, its caption in `captions/`, its data above, and a line here. */
export const figures: { [Name in FigureName]: FigureDefinition<FigureDataOf[Name]> } = {
  crossingChart: { title: 'Where every loop crosses', draw: drawCrossingChart, caption: captionOfCrossingChart },
  berthChart: { title: 'Berth around the critical point', draw: drawBerthChart, caption: captionOfBerthChart },
  returnDifferenceProfile: { title: 'Return difference', draw: drawReturnDifferenceProfile, caption: captionOfReturnDifferenceProfile },
  magnitudePhase: { title: 'Gain and phase', draw: drawMagnitudePhase, caption: captionOfMagnitudePhase },
  gainOverPhase: { title: 'Gain over phase', draw: drawGainOverPhase, caption: captionOfGainOverPhase },
  blockResponse: { title: 'Response of the block', draw: drawBlockResponse, caption: captionOfBlockResponse },
}
