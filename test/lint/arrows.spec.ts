import { ESLint } from 'eslint';
import tseslint from 'typescript-eslint';

/** Lints code as if it stood in a file, without types (the file need not exist). */
const eslint = new ESLint({
  overrideConfig: [
    {
      files: ['**/*.ts'],
      ...tseslint.configs.disableTypeChecked,
    },
    {
      files: ['**/*.ts'],
      rules: { '@angular-eslint/no-experimental': 'off', '@angular-eslint/no-uncalled-signals': 'off' },
    },
  ],
});

async function rulesBrokenBy(filePath: string, code: string): Promise<string[]> {
  const [result] = await eslint.lintText(code, { filePath });
  if (!result) throw new Error(`${filePath} was not linted`);
  return result.messages.map((message) => message.ruleId ?? `fatal: ${message.message}`);
}

const IMPORT = '@typescript-eslint/no-restricted-imports';
const SYNTAX = 'no-restricted-syntax';

/** The layers, each with what it must not reach. */
const FORBIDDEN_IMPORTS: readonly (readonly [file: string, from: string])[] = [
  ['src/app/core/x.ts', '../offline/outbox'],
  ['src/app/core/x.ts', '../features/weeks/weeks-page'],
  ['src/app/core/x.ts', '../shell/shell'],
  ['src/app/core/deep/x.ts', '../../offline/outbox'],
  ['src/app/offline/x.ts', '../features/loomside/loomside-page'],
  ['src/app/offline/x.ts', '../shell/shell'],
  ['src/app/ui/x.ts', '../core/clock'],
  ['src/app/ui/chart/x.ts', '../../core/clock'],
  ['src/app/ui/x.ts', '../features/weeks/weeks-page'],
  ['src/app/features/weeks/x.ts', '../shift-book/sheet-table'],
  ['src/app/features/weeks/deep/x.ts', '../../shift-book/sheet-table'],
  ['src/app/features/weeks/deep/er/x.ts', '../../../shift-book/sheet-table'],
  ['src/app/features/weeks/x.ts', '../../shell/shell'],
  ['src/app/features/weeks/x.ts', '../../../../api/deps'],
  ['src/app/features/weeks/x.ts', '../../../../shared/contract/reports'],
  ['src/app/features/weeks/x.ts', 'chart.js'],
  ['src/app/features/weeks/x.ts', 'ng2-charts'],
  ['src/app/features/weeks/x.ts', 'idb-keyval'],
  ['src/app/core/x.ts', 'idb-keyval'],
  ['src/app/ui/x.ts', 'idb-keyval'],
  ['src/app/shell/x.ts', 'idb-keyval'],
  ['src/app/app.ts', 'idb-keyval'],
  ['src/app/app.ts', 'typeorm'],
  ['src/app/app.ts', 'node:fs'],
  ['src/app/core/x.ts', 'zod'],
  ['src/app/core/x.ts', 'jstat'],
  ['src/app/core/x.ts', '../testing/fixed-clock'],
  ['api/features/sync/x.ts', '../../../src/app/core/clock.js'],
  ['api/features/sync/x.ts', '@angular/core'],
  ['api/features/sync/x.ts', 'idb-keyval'],
  ['api/features/sync/sync.routes.ts', '../../database/entities/book.entities.js'],
  ['api/features/sync/sync.routes.ts', 'typeorm'],
  ['api/middleware/authenticate.ts', 'typeorm'],
  ['api/database/x.ts', '../features/sync/sync.service.js'],
  ['shared/figures/x.ts', '../../api/deps.js'],
  ['shared/figures/x.ts', '../../src/app/core/clock.js'],
  ['shared/figures/x.ts', 'luxon'],
  ['shared/figures/x.ts', 'node:fs'],
  ['shared/figures/x.ts', 'zod'],
  ['shared/figures/x.ts', 'jstat'],
  ['shared/figures/x.ts', '../chance/poisson-interval.js'],
  ['shared/entries/x.ts', '../ahead/warp-out.js'],
  ['shared/chance/x.ts', 'zod/mini'],
];

const ALLOWED_IMPORTS: readonly (readonly [file: string, from: string])[] = [
  ['src/app/shell/x.ts', '../features/weeks/weeks-page'],
  ['src/app/shell/x.ts', '../offline/offline-book'],
  ['src/app/features/weeks/x.ts', '../../offline/offline-book'],
  ['src/app/features/weeks/x.ts', '../../core/clock'],
  ['src/app/features/weeks/x.ts', '../../ui/chart/chart'],
  ['src/app/features/weeks/x.ts', './weeks-table'],
  ['src/app/features/weeks/deep/x.ts', '../weeks-table'],
  ['src/app/features/weeks/x.ts', '@shared/contract/reports'],
  ['src/app/offline/x.ts', 'idb-keyval'],
  ['src/app/offline/x.ts', '../core/clock'],
  ['src/app/ui/chart/x.ts', 'ng2-charts'],
  ['src/app/core/x.spec.ts', '../testing/fixed-clock'],
  ['api/features/sync/sync.service.ts', '../../database/entities/book.entities.js'],
  ['api/features/sync/x.ts', '../../../shared/contract/sync.js'],
  ['shared/figures/x.ts', 'zod/mini'],
  ['shared/looms-per-weaver/x.ts', '../figures/no-figure.js'],
  ['shared/figures/x.spec.ts', '../chance/poisson-interval.js'],
  ['shared/figures/x.spec.ts', 'fast-check'],
  ['shared/chance/x.ts', 'jstat'],
];

describe('the arrows', () => {
  it.each(FORBIDDEN_IMPORTS)('%s must not import %s', async (file, from) => {
    expect(await rulesBrokenBy(file, `import { x } from '${from}';\nx();\n`)).toContain(IMPORT);
    expect(await rulesBrokenBy(file, `import type { X } from '${from}';\nexport type Y = X;\n`)).toContain(
      IMPORT,
    );
    expect(await rulesBrokenBy(file, `export * from '${from}';\n`)).toContain(IMPORT);
    expect(await rulesBrokenBy(file, `export const later = () => import('${from}');\n`)).toContain(SYNTAX);
    expect(await rulesBrokenBy(file, `export type Y = import('${from}').X;\n`)).toContain(SYNTAX);
  });

  it.each(ALLOWED_IMPORTS)('%s may import %s', async (file, from) => {
    expect(await rulesBrokenBy(file, `import { x } from '${from}';\nx();\n`)).toEqual([]);
  });
});

describe('the statistics', () => {
  it.each(['src/app/features/weeks/x.ts', 'src/app/core/x.ts', 'src/main.ts'])(
    'are fetched by %s when they are shown, not at once',
    async (file) => {
      for (const from of ['@shared/chance/poisson-interval', '@shared/ahead/warp-out']) {
        expect(await rulesBrokenBy(file, `import { x } from '${from}';\nx();\n`)).toContain(IMPORT);
        expect(await rulesBrokenBy(file, `export * from '${from}';\n`)).toContain(IMPORT);
        expect(await rulesBrokenBy(file, `import type { X } from '${from}';\nexport type Y = X;\n`)).toEqual(
          [],
        );
        expect(await rulesBrokenBy(file, `export const later = () => import('${from}');\n`)).toEqual([]);
      }
    },
  );
});

describe('shared has no clock and no chance', () => {
  it.each(['Date.now()', 'new Date()', 'Math.random()', 'Date()'])('%s', async (code) => {
    expect(await rulesBrokenBy('shared/figures/x.ts', `export const x = ${code};\n`)).toContain(SYNTAX);
    expect(await rulesBrokenBy('shared/figures/x.spec.ts', `export const x = ${code};\n`)).toContain(SYNTAX);
  });

  it('takes a moment as a parameter', async () => {
    expect(
      await rulesBrokenBy('shared/figures/x.ts', 'export const x = (at: number) => new Date(at);\n'),
    ).toEqual([]);
  });
});

describe('the one writer', () => {
  const file = 'api/features/sync/sync.service.ts';

  it.each([
    'manager.save(row)',
    'repository.insert(row)',
    'deps.reads.getRepository(Row).upsert(row)',
    'deps.reads.getRepository(Row).delete({ id })',
    'deps.reads.manager.insert(Row, row)',
    'dataSource.getRepository(Row)',
    'dataSource.transaction(work)',
    'dataSource.createQueryRunner()',
    "reads.query('insert into entry values (1)')",
    'reads.query(`UPDATE entry SET x = ${id}`)',
    "database.exec('DELETE FROM entry')",
  ])('is not gone round by %s', async (code) => {
    expect(await rulesBrokenBy(file, `export const x = () => ${code};\n`)).toContain(SYNTAX);
  });

  it.each([
    'tx.insert(Row, row)',
    'tx.getRepository(Row).save(row)',
    "tx.query('insert into entry values (1)')",
    "reads.query('select 1')",
    'deps.reads.getRepository(Row).find()',
    'seen.delete(id)',
  ])('takes %s', async (code) => {
    expect(await rulesBrokenBy(file, `export const x = () => ${code};\n`)).toEqual([]);
  });
});

describe('specs', () => {
  it.each([
    'it.only',
    'it.skip',
    'describe.only',
    'test.describe.skip',
    'test.fixme',
    'it.todo',
    'xit',
    'fdescribe',
  ])('%s is refused', async (call) => {
    for (const file of ['shared/figures/x.spec.ts', 'src/app/core/x.spec.ts', 'test/e2e/x.spec.ts'])
      expect(await rulesBrokenBy(file, `${call}('x', () => undefined);\n`)).toContain(SYNTAX);
  });
});

describe('Angular', () => {
  it('wants OnPush, inject() and signals', async () => {
    const broken = await rulesBrokenBy(
      'src/app/ui/x.ts',
      `import { Component, Input } from '@angular/core';
       import { Clock } from './clock';
       @Component({ selector: 'app-x', template: '<button (click)="y">x</button>' })
       export class X { @Input() y = 1; constructor(private readonly clock: Clock) { this.clock.tick(); } }`,
    );
    expect(broken).toEqual(
      expect.arrayContaining([
        '@angular-eslint/prefer-on-push-component-change-detection',
        '@angular-eslint/prefer-signals',
        '@angular-eslint/prefer-inject',
      ]),
    );
  });
});
