import type { DrawStatement } from '../language/index.ts';
import type { FigureContent, FigureSources } from './figure-sources.ts';
import { regionContent } from './region-figure.ts';
import { responseContent } from './response-figure.ts';
import { stopAt } from './stop.ts';

/** The data of a figure; stops at figures that are not available yet and at what cannot be drawn. */
export function figureContent(node: DrawStatement, sources: FigureSources): FigureContent {
  switch (node.figure) {
    case 'region':
      return regionContent(node, sources);
    case 'response':
      return responseContent(node, sources);
    default:
      return stopAt(
        node.figureSpan,
        'not-available-yet',
        `The figure \`${node.figure}\` is not available yet.`,
      );
  }
}
