import type { BeamForm } from '@shared/contract/set-up';
import { QUANTITIES, nameProblem, readWithin, textOf, type Units } from '../cloths/typed';

/** A beam's form as typed, lengths in the mill's units. */
export interface BeamValues {
  readonly name: string;
  readonly clothId: string;
  readonly length: string;
  readonly thrum: string;
}

export interface BeamReading {
  /** Null: something is not right yet. */
  readonly beam: BeamForm | null;
  readonly problems: Readonly<Partial<Record<keyof BeamValues, string>>>;
}

/** What cannot be woven at a warp's end, common practice, m. */
const USUAL_THRUM = 1.5;

export function beamValuesOf(beam: BeamForm | null, units: Units, clothId = ''): BeamValues {
  if (!beam) return { name: '', clothId, length: '', thrum: textOf(USUAL_THRUM, QUANTITIES.length[units]) };
  return {
    name: beam.name,
    clothId: beam.clothId,
    length: textOf(beam.lengthM, QUANTITIES.length[units]),
    thrum: textOf(beam.thrumM, QUANTITIES.length[units]),
  };
}

/** What the form says; a stored length stays as it is while its text does. */
export function readBeam(
  values: BeamValues,
  units: Units,
  stored: BeamForm | null = null,
  taken: readonly string[] = [],
): BeamReading {
  const problems: Partial<Record<keyof BeamValues, string>> = {};
  const quantity = QUANTITIES.length[units];
  const named = nameProblem(values.name, 'the beam', taken);
  if (named) problems.name = named;
  if (!values.clothId) problems.clothId = 'Choose the cloth that this warp is for.';
  const length = readWithin(
    values.length,
    quantity,
    { what: 'the length of the warp', usual: 800, most: 100_000 },
    stored?.lengthM,
  );
  if (length.problem) problems.length = length.problem;
  const thrum = readWithin(
    values.thrum,
    quantity,
    { what: 'the thrum', usual: USUAL_THRUM, least: 0, most: 1_000 },
    stored?.thrumM,
  );
  if (thrum.problem) problems.thrum = thrum.problem;
  if (length.value !== null && thrum.value !== null && thrum.value >= length.value)
    problems.thrum = 'The thrum is what is left over at the end: less than the whole warp.';
  if (length.value === null || thrum.value === null || Object.keys(problems).length > 0)
    return { beam: null, problems };
  const beam = {
    name: values.name.trim(),
    clothId: values.clothId,
    lengthM: length.value,
    thrumM: thrum.value,
  };
  return { beam, problems };
}
