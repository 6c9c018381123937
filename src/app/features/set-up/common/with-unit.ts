import { isNoFigure } from '@shared/figures/no-figure';
import { limitText, type Quantity } from './quantity';

/** A stored value as a list shows it, with its unit: "168 cm". */
export function withUnit(stored: number, quantity: Quantity): string {
  const shown = quantity.shown(stored);
  if (isNoFigure(shown)) return '–';
  const text = limitText(shown, Math.min(2, quantity.decimals));
  return quantity.unit === '%' ? `${text}%` : `${text} ${quantity.unit}`.trim();
}
