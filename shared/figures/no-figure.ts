import * as z from 'zod/mini';

/**
 * Why a figure cannot be given. A figure is a number or one of these reasons, never NaN, Infinity or a zero
 * that means "unknown". The sentence for each reason is in `noFigureSentence`.
 */
export const NO_FIGURE_REASONS = [
  'no-picks',
  'no-start-reading',
  'no-end-reading',
  'readings-disagree',
  'shift-not-over',
  'no-time',
  'no-speed',
  'no-ends',
  'no-cloth',
  'no-exposure',
  'not-comparable',
  'out-of-range',
  'missing-input',
  'no-events',
  'no-limit',
  'beyond-calendar',
] as const;

export type NoFigureReason = (typeof NO_FIGURE_REASONS)[number];

/** The typed answer "no figure, because …". */
export interface NoFigure {
  readonly none: NoFigureReason;
}

/** A number with its unit named by the field that carries it, or the reason why there is none. */
export type Figure = number | NoFigure;

export const figureSchema = z.union([z.number(), z.object({ none: z.enum(NO_FIGURE_REASONS) })]);

/** Makes the answer "no figure, because `reason`". */
export function noFigure(reason: NoFigureReason): NoFigure {
  return { none: reason };
}

/** Whether a figure is the answer "no figure". */
export function isNoFigure(figure: unknown): figure is NoFigure {
  return typeof figure === 'object' && figure !== null && 'none' in figure;
}

/** The number, or null where there is none: for charts and sorting, where the reason is shown elsewhere. */
export function numberOrNull(figure: Figure): number | null {
  return isNoFigure(figure) ? null : figure;
}

const SENTENCES: Record<NoFigureReason, string> = {
  'no-picks': 'no picks were woven',
  'no-start-reading': 'the reading at the start is missing',
  'no-end-reading': 'the reading at the end is missing',
  'readings-disagree': 'two readings disagree and nobody has decided',
  'shift-not-over': 'the shift is not over',
  'no-time': 'no time to hold it against',
  'no-speed': 'the loom’s speed is not known',
  'no-ends': 'the number of ends is not known',
  'no-cloth': 'the cloth is not known',
  'no-exposure': 'too little was woven to say',
  'not-comparable': 'the two are not comparable',
  'out-of-range': 'the input is outside what is possible',
  'missing-input': 'an input is missing',
  'no-events': 'nothing was counted to hold it against',
  'no-limit': 'there is no limit on that side',
  'beyond-calendar': 'the calendar of shifts does not reach that far',
};

/** The reason in plain words, without a full stop, to stand after "No figure: ". */
export function noFigureSentence(figure: NoFigure): string {
  return SENTENCES[figure.none];
}
