import type { ClothFacts } from '@shared/contract/set-up';
import { crimpOfTakeUp, takeUpOfCrimp } from '@shared/figures/crimp';
import type { CountSystem } from '@shared/figures/yarn';
import {
  PERCENT,
  PLAIN,
  QUANTITIES,
  countQuantity,
  nameProblem,
  readWithin,
  textOf,
  type Quantity,
  type ReadValue,
  type Units,
} from './typed';

/** A weft as typed. `kept` is its place in the stored cloth: its numbers stay as stored where their texts do. */
export interface WeftValues {
  readonly name: string;
  readonly system: CountSystem;
  readonly count: string;
  readonly share: string;
  readonly waste: string;
  readonly pernMass: string;
  readonly kept: number | null;
}
export type WeftField = Exclude<keyof WeftValues, 'kept' | 'system'>;

/** A cloth's form as typed, in the mill's units. */
export interface ClothValues {
  readonly name: string;
  readonly ends: string;
  readonly picksOnLoom: string;
  readonly picksLoomState: string;
  readonly reedWidth: string;
  readonly contractionAs: 'crimp' | 'take-up';
  readonly contraction: string;
  readonly abreast: string;
  readonly wefts: readonly WeftValues[];
}
export type ClothField = Exclude<keyof ClothValues, 'wefts' | 'contractionAs'> | 'wefts';

export interface ClothReading {
  /** Null: something is not right yet. */
  readonly facts: ClothFacts | null;
  readonly name: string;
  readonly problems: Readonly<Partial<Record<ClothField, string>>>;
  readonly weftProblems: readonly Readonly<Partial<Record<WeftField, string>>>[];
  /** Not wrong, but worth a second look. */
  readonly advice: string;
}

/** The systems of count that a form offers. */
export const COUNT_SYSTEMS: readonly { readonly system: CountSystem; readonly label: string }[] = [
  { system: 'tex', label: 'tex' },
  { system: 'Ne', label: 'cotton count (Ne)' },
  { system: 'lea', label: 'linen lea' },
];

/** Percentages of shares are typed rounded: three thirds as 33.33 are a whole. */
const SHARES_TOLERANCE = 0.0005;
const CRIMP = { what: 'the crimp', usual: 0.06, least: 0, most: 1 };

export function emptyWeft(units: Units, share: string): WeftValues {
  const system = units === 'metric' ? 'tex' : 'Ne';
  return { name: '', system, count: '', share, waste: '', pernMass: '', kept: null };
}

/** The form as it opens: empty, or what is stored. */
export function clothValuesOf(cloth: { name: string; facts: ClothFacts } | null, units: Units): ClothValues {
  if (!cloth)
    return {
      name: '',
      ends: '',
      picksOnLoom: '',
      picksLoomState: '',
      reedWidth: '',
      contractionAs: 'crimp',
      contraction: '',
      abreast: '1',
      wefts: [emptyWeft(units, '100')],
    };
  const { name, facts } = cloth;
  const system: CountSystem = units === 'metric' ? 'tex' : 'Ne';
  return {
    name,
    ends: String(facts.ends),
    picksOnLoom: textOf(facts.picksPerCmOnLoom, QUANTITIES.sett[units]),
    picksLoomState: textOf(facts.picksPerCmLoomState, QUANTITIES.sett[units]),
    reedWidth: textOf(facts.reedWidthCm, QUANTITIES.width[units]),
    contractionAs: 'crimp',
    contraction: textOf(facts.crimp, PERCENT),
    abreast: String(facts.abreast),
    wefts: facts.wefts.map((weft, kept) => ({
      name: weft.name,
      system,
      count: textOf(weft.tex, countQuantity(system)),
      share: textOf(weft.share, PERCENT),
      waste: textOf(weft.waste, PERCENT),
      pernMass: textOf(weft.pernMassG, QUANTITIES.mass[units]),
      kept,
    })),
  };
}

/** Take-up in percent, stored as crimp. */
const TAKE_UP: Quantity = {
  unit: '%',
  decimals: 3,
  shown: (crimp) => {
    const takeUp = takeUpOfCrimp(crimp);
    return typeof takeUp === 'number' ? takeUp * 100 : takeUp;
  },
  stored: (percent) => crimpOfTakeUp(percent / 100),
};

function contractionQuantity(as: ClothValues['contractionAs']): Quantity {
  return as === 'crimp' ? PERCENT : TAKE_UP;
}

/** What the form says, read whole: facts in stored units, or what is wrong with each field. */
export function readCloth(
  values: ClothValues,
  units: Units,
  stored: ClothFacts | null = null,
  taken: readonly string[] = [],
): ClothReading {
  const problems: Partial<Record<ClothField, string>> = {};
  const take = (field: ClothField, read: ReadValue) => {
    if (read.problem) problems[field] = read.problem;
    return read.value ?? Number.NaN;
  };
  const named = nameProblem(values.name, 'the cloth', taken);
  if (named) problems.name = named;
  const sett = QUANTITIES.sett[units];
  const facts = {
    ends: take(
      'ends',
      readWithin(values.ends, PLAIN, {
        what: 'the number of ends',
        usual: 3360,
        least: 1,
        most: 100_000,
        whole: true,
      }),
    ),
    picksPerCmOnLoom: take(
      'picksOnLoom',
      readWithin(
        values.picksOnLoom,
        sett,
        { what: 'the setting on the loom', usual: 20, most: 500 },
        stored?.picksPerCmOnLoom,
      ),
    ),
    picksPerCmLoomState: take(
      'picksLoomState',
      readWithin(
        values.picksLoomState,
        sett,
        { what: 'the setting in loom state', usual: 20.8, most: 500 },
        stored?.picksPerCmLoomState,
      ),
    ),
    reedWidthCm: take(
      'reedWidth',
      readWithin(
        values.reedWidth,
        QUANTITIES.width[units],
        { what: 'the reed width', usual: 168, most: 1_000 },
        stored?.reedWidthCm,
      ),
    ),
    crimp: take(
      'contraction',
      readWithin(
        values.contraction,
        contractionQuantity(values.contractionAs),
        { ...CRIMP, what: `the ${values.contractionAs}` },
        stored?.crimp,
      ),
    ),
    abreast: take(
      'abreast',
      readWithin(values.abreast, PLAIN, {
        what: 'the number of cloths abreast',
        usual: 1,
        least: 1,
        most: 8,
        whole: true,
      }),
    ),
  };
  const wefts = readWefts(values.wefts, units, stored);
  const sharesProblem = wefts.every((weft) => !weft.problems.share) ? sharesWrong(wefts) : '';
  if (wefts.length === 0) problems.wefts = 'A cloth has at least one weft.';
  else if (wefts.length > 8) problems.wefts = 'A cloth has at most 8 wefts.';
  else if (sharesProblem) problems.wefts = sharesProblem;
  const weftProblems = wefts.map((weft) => weft.problems);
  const whole =
    Object.keys(problems).length === 0 && weftProblems.every((each) => Object.keys(each).length === 0);
  return {
    facts: whole ? { ...facts, wefts: wefts.map((weft) => weft.facts) } : null,
    name: values.name.trim(),
    problems,
    weftProblems,
    advice:
      facts.picksPerCmLoomState < facts.picksPerCmOnLoom
        ? 'Off the loom cloth draws together: loom state has usually more picks than on the loom, not fewer.'
        : '',
  };
}

interface WeftReading {
  readonly facts: ClothFacts['wefts'][number];
  readonly problems: Partial<Record<WeftField, string>>;
}

function readWefts(wefts: readonly WeftValues[], units: Units, stored: ClothFacts | null): WeftReading[] {
  return wefts.map((weft, index) => {
    const problems: Partial<Record<WeftField, string>> = {};
    const kept = weft.kept === null ? undefined : stored?.wefts[weft.kept];
    const take = (field: WeftField, read: ReadValue) => {
      if (read.problem) problems[field] = read.problem;
      return read.value ?? Number.NaN;
    };
    const others = wefts.filter((_, place) => place !== index).map((other) => other.name);
    const named = nameProblem(weft.name, 'the weft', others);
    if (named) problems.name = named;
    const facts = {
      name: weft.name.trim(),
      tex: take(
        'count',
        readWithin(
          weft.count,
          countQuantity(weft.system),
          { what: 'the count', usual: 25, most: 20_000 },
          kept?.tex,
        ),
      ),
      share: take(
        'share',
        readWithin(weft.share, PERCENT, { what: 'the share', usual: 1, most: 1 }, kept?.share),
      ),
      waste: take(
        'waste',
        readWithin(
          weft.waste,
          PERCENT,
          { what: 'the waste', usual: 0.03, least: 0, most: 1, below: true },
          kept?.waste,
        ),
      ),
      pernMassG: take(
        'pernMass',
        readWithin(
          weft.pernMass,
          QUANTITIES.mass[units],
          { what: 'the weft on a full pern', usual: 28, most: 2_000 },
          kept?.pernMassG,
        ),
      ),
    };
    return { facts, problems };
  });
}

/** Empty where the shares are a whole. */
function sharesWrong(wefts: readonly WeftReading[]): string {
  const sum = wefts.reduce((all, weft) => all + weft.facts.share, 0);
  if (Math.abs(sum - 1) <= SHARES_TOLERANCE) return '';
  const off = textOf(Math.abs(1 - sum), PERCENT);
  return `The shares add up to ${textOf(sum, PERCENT)}%, not 100%: ${off}% ${sum > 1 ? 'too much' : 'is missing'}.`;
}

/** The form with the same warp contraction said the other way. */
export function withContractionAs(
  values: ClothValues,
  as: ClothValues['contractionAs'],
  stored: ClothFacts | null,
): ClothValues {
  if (as === values.contractionAs) return values;
  const { value } = readWithin(
    values.contraction,
    contractionQuantity(values.contractionAs),
    CRIMP,
    stored?.crimp,
  );
  const contraction = value === null ? values.contraction : textOf(value, contractionQuantity(as));
  return { ...values, contractionAs: as, contraction };
}

/** The other way to say the warp's contraction: "Take-up 5.66%"; empty: not readable. */
export function otherContraction(values: ClothValues): string {
  const { value } = readWithin(values.contraction, contractionQuantity(values.contractionAs), CRIMP);
  if (value === null) return '';
  const other = values.contractionAs === 'crimp' ? 'take-up' : 'crimp';
  const figure = contractionQuantity(other).shown(value);
  return typeof figure === 'number' ? `That is a ${other} of ${figure.toFixed(2)}%.` : '';
}

/** A weft with the same count by another system. */
export function withSystem(weft: WeftValues, system: CountSystem, storedTex: number | null): WeftValues {
  const read = readWithin(
    weft.count,
    countQuantity(weft.system),
    { what: '', usual: 25, most: 20_000 },
    storedTex,
  );
  const count = read.value === null ? weft.count : textOf(read.value, countQuantity(system));
  return { ...weft, system, count };
}

/** What is left to 100%, for the next weft. */
export function shareLeft(wefts: readonly WeftValues[]): string {
  const shares = wefts.map(
    (weft) => readWithin(weft.share, PERCENT, { what: '', usual: 1, most: 1 }).value ?? 0,
  );
  const left = 1 - shares.reduce((sum, share) => sum + share, 0);
  return left > SHARES_TOLERANCE ? textOf(left, PERCENT) : '';
}
