import { readFileSync } from 'node:fs';
import { APP_VERSION } from '../../src/app/core/app-version';

it('the application says the version that package.json has', () => {
  const file = new URL('../../package.json', import.meta.url);
  const { version } = JSON.parse(readFileSync(file, 'utf8')) as { version: string };
  expect(APP_VERSION).toBe(version);
});
