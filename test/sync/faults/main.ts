import 'fake-indexeddb/auto';
import { rmSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { proveRuns } from './prove';
import { SABOTAGES, type SabotageName } from './sabotage';
import { templateMill } from './template-mill';

/** `npm run faults -- --runs N --seed S [--sabotage NAME]`: exits 1 on any loss and prints its seed. */
async function main(): Promise<void> {
  const { values } = parseArgs({
    options: {
      runs: { type: 'string', default: '50' },
      seed: { type: 'string', default: '1' },
      sabotage: { type: 'string' },
    },
  });
  const { sabotage } = values;
  if (sabotage !== undefined && !isSabotage(sabotage))
    throw new Error(`There is no sabotage ${sabotage}: ${Object.keys(SABOTAGES).join(', ')}.`);
  const template = await templateMill();
  try {
    const proof = await proveRuns({
      runs: Number(values.runs),
      seed: Number(values.seed),
      template,
      sabotage,
      say: (line) => console.error(line),
    });
    console.log(JSON.stringify(proof));
    if (proof.lost + proof.doubled + proof.misattributed + proof.unseen > 0) process.exitCode = 1;
  } finally {
    rmSync(template, { recursive: true, force: true });
  }
}

function isSabotage(name: string): name is SabotageName {
  return name in SABOTAGES;
}

await main();
