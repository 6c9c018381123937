import { TestBed, type ComponentFixture } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import type { ClothFacts, SetUp } from '@shared/contract/set-up';
import { json, StubServer } from '../../../testing/stub-server';
import { provideIcons } from '../../../ui/icons';
import { SetUpStore } from '../common/set-up-store';
import { Unsaved } from '../common/unsaved';
import { ClothPage } from './cloth-page';

/** Numbers that no rounded text can carry. */
const FACTS: ClothFacts = {
  ends: 3360,
  picksPerCmOnLoom: 50 / 2.54,
  picksPerCmLoomState: 20.123456789,
  reedWidthCm: 167.64000000000001,
  crimp: 1 / 17,
  abreast: 1,
  wefts: [
    { name: 'Red', tex: 590.541 / 24, share: 1 / 3, waste: 0.0333333, pernMassG: 28.349523125 },
    { name: 'Blue', tex: 29.52704, share: 2 / 3, waste: 1 / 30, pernMassG: 27.1 },
  ],
};
const SET_UP: SetUp = {
  mill: { name: 'Test', timeZone: 'Europe/London', units: 'imperial' },
  sheds: [],
  looms: [],
  loomVersions: [],
  alleys: [],
  cloths: [{ id: 'glebe', name: 'Glebe 42' }],
  clothVersions: [{ id: 'glebe.1', clothId: 'glebe', effectiveAt: 946_684_800_000, ...FACTS }],
  beams: [],
  causeVersions: [],
  targets: [],
  parts: [],
  jobs: [],
  patterns: [],
  calendar: [],
  shifts: [],
};

// The first page of a run compiles its components: slow on a machine that does much else.
vi.setConfig({ testTimeout: 30_000 });

let server: StubServer;
let fixture: ComponentFixture<ClothPage>;

const page = () => fixture.nativeElement as HTMLElement;
const sent = (path: string) =>
  server.asked.filter((one) => one.path === path).map(({ body }) => body as { facts?: ClothFacts });

function fieldOf(label: string): HTMLInputElement {
  const found = [...page().querySelectorAll('mat-form-field')].find(
    (one) => one.querySelector('mat-label')?.textContent === label,
  );
  const input = found?.querySelector('input');
  if (!input) throw new Error(`no field ${label}`);
  return input;
}

function type(label: string, text: string): void {
  const input = fieldOf(label);
  input.value = text;
  input.dispatchEvent(new Event('input', { bubbles: true }));
}

async function save(): Promise<void> {
  page()
    .querySelector('form')
    ?.dispatchEvent(new Event('submit', { cancelable: true }));
  await fixture.whenStable();
}

beforeEach(async () => {
  server = new StubServer();
  vi.stubGlobal('fetch', server.fetch);
  server.on('/api/set-up', () => json(SET_UP));
  for (const path of ['/api/set-up/cloths/glebe', '/api/set-up/cloths/glebe/versions'])
    server.on(path, () => json({ ids: ['glebe'] }));
  TestBed.configureTestingModule({
    providers: [provideRouter([{ path: '**', children: [] }]), provideIcons(), SetUpStore, Unsaved],
  });
  await TestBed.inject(SetUpStore).reload();
  fixture = TestBed.createComponent(ClothPage);
  fixture.componentRef.setInput('id', 'glebe');
  await fixture.whenStable();
});

afterEach(() => {
  vi.unstubAllGlobals();
});

it('shows a cloth in the mill’s units, and what it comes to', () => {
  expect(fieldOf('Reed width').value).toBe('66');
  expect(fieldOf('Picks on the loom').value).toBe('50');
  expect(fieldOf('Count').value).toBe('24');
  expect(page().textContent).toContain('A full pern of Red lasts');
});

it('sends nothing of a construction that nobody changed, in whatever units it is shown', async () => {
  type('Name', 'Glebe 43');
  await save();
  expect(sent('/api/set-up/cloths/glebe')).toEqual([{ name: 'Glebe 43', retired: false }]);
  expect(sent('/api/set-up/cloths/glebe/versions')).toEqual([]);
});

it('sends what is new, and all else as it is stored, to the bit', async () => {
  type('Reed width', '70');
  await save();
  expect(sent('/api/set-up/cloths/glebe/versions').map(({ facts }) => facts)).toEqual([
    { ...FACTS, reedWidthCm: 177.8 },
  ]);
});

it('keeps the cloth where the same contraction is only said the other way', async () => {
  const takeUp = [...page().querySelectorAll<HTMLInputElement>('input[type=radio]')].at(1);
  takeUp?.click();
  await fixture.whenStable();
  expect(fieldOf('Take-up').value).toBe('5.556');
  type('Name', 'Glebe 43');
  await save();
  expect(sent('/api/set-up/cloths/glebe/versions')).toEqual([]);
});

it('says what is wrong as it is typed, and sends nothing', async () => {
  type('Reed width', 'wide');
  await fixture.whenStable();
  expect(page().textContent).toContain('“wide” is no number.');
  await save();
  expect(sent('/api/set-up/cloths/glebe/versions')).toEqual([]);
});
