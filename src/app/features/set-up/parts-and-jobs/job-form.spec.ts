import { jobValuesOf, picksInHours, readJob, type JobValues } from './job-form';

const values: JobValues = { name: 'Oil the picking shafts', everyPicks: '5,000,000' };

it('reads what it shows', () => {
  const job = { name: 'Oil the picking shafts', everyPicks: 5_000_000 };
  expect(jobValuesOf(job)).toEqual(values);
  expect(readJob(values).job).toEqual(job);
});

it.each<[keyof JobValues, Partial<JobValues>, string]>([
  ['name', { name: '' }, 'Give the job a name.'],
  ['name', { name: 'Clean the race' }, 'There is one called Clean the race already. Choose another name.'],
  ['everyPicks', { everyPicks: '' }, 'Type the number of picks, such as 5,000,000 picks.'],
  [
    'everyPicks',
    { everyPicks: '5 mio' },
    '“5 mio” is no number. Type the number of picks, such as 5,000,000 picks.',
  ],
  [
    'everyPicks',
    { everyPicks: '999' },
    'The number of picks is at least 1,000 and at most 10,000,000,000 picks.',
  ],
  ['everyPicks', { everyPicks: '5000.5' }, 'The number of picks is a whole number, such as 5,000,000.'],
])('%s: %j', (field, change, sentence) => {
  const reading = readJob({ ...values, ...change }, ['clean the race']);
  expect(reading.problems).toEqual({ [field]: sentence });
  expect(reading.job).toBeNull();
});

it('says how long that is on the mill’s looms', () => {
  const looms = [{ ppm: 150 }, { ppm: 160 }, { ppm: 210 }];
  expect(picksInHours(5_000_000, looms)).toBe('about 521 running hours at 160 ppm');
  expect(picksInHours(10_000, looms)).toBe('about 63 running minutes at 160 ppm');
  expect(picksInHours(10_000, [])).toBe('');
});
