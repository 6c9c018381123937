import type * as z from 'zod/mini';
import { limitText, type Quantity } from './quantity';

/** What a schema asks of one field, read from it: a form says both ends where the schema knows them. */
export interface FieldLimits {
  readonly kind: 'number' | 'text' | 'other';
  readonly least: number | null;
  readonly most: number | null;
  /** The end itself is not allowed. */
  readonly leastIsOut: boolean;
  readonly mostIsOut: boolean;
  readonly whole: boolean;
}

type Definition = Readonly<Record<string, unknown>>;

/** The limits of a zod/mini schema; of what is optional or nullable those of what is in it. */
export function limitsOf(schema: z.core.$ZodType): FieldLimits {
  const definition = schema._zod.def as unknown as Definition;
  const inner = definition['innerType'];
  if (inner) return limitsOf(inner as z.core.$ZodType);
  const limits = {
    kind: kindOf(definition['type']),
    least: null as number | null,
    most: null as number | null,
    leastIsOut: false,
    mostIsOut: false,
    whole: definition['format'] === 'safeint',
  };
  for (const check of checksOf(definition)) {
    const value = check['value'] ?? check['minimum'] ?? check['maximum'];
    if (typeof value !== 'number') continue;
    if (check['check'] === 'greater_than' || check['check'] === 'min_length') {
      limits.least = value;
      limits.leastIsOut = check['inclusive'] === false;
    }
    if (check['check'] === 'less_than' || check['check'] === 'max_length') {
      limits.most = value;
      limits.mostIsOut = check['inclusive'] === false;
    }
  }
  return limits;
}

function checksOf(definition: Definition): readonly Definition[] {
  const checks = (definition['checks'] ?? []) as readonly { readonly _zod: { readonly def: Definition } }[];
  return checks.map((check) => check._zod.def);
}

function kindOf(type: unknown): FieldLimits['kind'] {
  if (type === 'number') return 'number';
  return type === 'string' ? 'text' : 'other';
}

/** "Speed is between 1 and 2,000 picks a minute." */
export function limitSentence(label: string, limits: FieldLimits, quantity: Quantity): string {
  if (limits.kind === 'text') return textSentence(label, limits);
  if (limits.kind === 'other') return `${label}: choose one.`;
  const unit = quantity.unit ? ` ${quantity.unit}` : '';
  const whole = limits.whole ? 'a whole number ' : '';
  const least = limits.least === null ? null : shownLimit(limits.least, quantity);
  const most = limits.most === null ? null : shownLimit(limits.most, quantity);
  if (least !== null && most !== null) {
    if (limits.leastIsOut)
      return `${label} is ${whole}more than ${least} and ${limits.mostIsOut ? 'less than' : 'at most'} ${most}${unit}.`;
    if (limits.mostIsOut) return `${label} is ${whole}from ${least} to less than ${most}${unit}.`;
    return `${label} is ${whole}between ${least} and ${most}${unit}.`;
  }
  if (least !== null)
    return `${label} is ${whole}${limits.leastIsOut ? 'more than' : 'at least'} ${least}${unit}.`;
  if (most !== null)
    return `${label} is ${whole}${limits.mostIsOut ? 'less than' : 'at most'} ${most}${unit}.`;
  return `${label} is ${whole || 'a number '}`.trimEnd() + '.';
}

function textSentence(label: string, { least, most }: FieldLimits): string {
  if (most === null) return `${label} is missing.`;
  return least
    ? `${label} has ${least} to ${limitText(most)} characters.`
    : `${label} has at most ${limitText(most)} characters.`;
}

function shownLimit(stored: number, quantity: Quantity): string {
  const shown = quantity.shown(stored);
  return typeof shown === 'number' ? limitText(shown, quantity.decimals) : limitText(stored);
}
