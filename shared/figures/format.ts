/**
 * Figures as they are shown: rounding is for display alone, and sheet, tablet and PDF round alike. British English.
 */
const oneDecimal = new Intl.NumberFormat('en-GB', { minimumFractionDigits: 1, maximumFractionDigits: 1 });
const whole = new Intl.NumberFormat('en-GB', { maximumFractionDigits: 0 });
/** Typographers' minus, and no "−0.0". */
const signed = (text: string) => (/^-0(\.0)?$/.test(text) ? text.slice(1) : text.replace('-', '−'));

/** A share as a percentage with one decimal: .9615 is "96.2%". */
export function formatPercent(share: number): string {
  return `${signed(oneDecimal.format(share * 100))}%`;
}

/** A rate with one decimal, such as breaks per 10⁵ picks: 4.0404 is "4.0". */
export function formatRate(rate: number): string {
  return signed(oneDecimal.format(rate));
}

/** A count, or picks, with thousands separators: 74250 is "74,250". */
export function formatCount(count: number): string {
  return signed(whole.format(count));
}

/**
 * Minutes in words: under an hour "4 min 10 s" ("45 s", "4 min"), from an hour on "1 h 5 min", seconds rounded away.
 *
 * @param minutes of any sign
 */
export function formatMinutes(minutes: number): string {
  const sign = minutes < 0 ? '−' : '';
  const seconds = Math.round(Math.abs(minutes) * 60);
  if (seconds === 0) return '0 min';
  const parts = seconds < 3600 ? [seconds / 60, 'min', seconds % 60, 's'] : hours(seconds);
  const [large, largeUnit, small, smallUnit] = parts as [number, string, number, string];
  const words = [
    ...(large >= 1 ? [`${whole.format(Math.floor(large))} ${largeUnit}`] : []),
    ...(small > 0 ? [`${small} ${smallUnit}`] : []),
  ];
  return sign + words.join(' ');
}

function hours(seconds: number): [number, string, number, string] {
  const minutes = Math.round(seconds / 60);
  return [minutes / 60, 'h', minutes % 60, 'min'];
}
