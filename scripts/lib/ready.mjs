import { accessSync, constants, existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import path from 'node:path';
import { isStale, remember, stampOf } from './stamps.mjs';
import { ROOT, run, runTool } from './run.mjs';
import { CannotGoOn, seconds } from './say.mjs';

/** Node of a version that every part accepts. */
export function checkNode() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
  if (major >= 23 || major < 20 || (major === 20 && minor < 19))
    throw new CannotGoOn(
      `This is Node ${process.versions.node}; Shedbeat needs Node 20.19 or later, below 23. Install Node 20 or 22, then run this again.`,
    );
}

/** The packages of package-lock.json: installed where they are missing or others. */
export async function ensureInstalled() {
  if (isInstalled()) return;
  const began = Date.now();
  console.log('Installing packages (about a minute and a half the first time) …');
  const { code } = await run('npm', ['ci', '--no-audit', '--no-fund', '--loglevel=error']);
  if (code !== 0) throw new CannotGoOn(await whyNotInstalled(code));
  console.log(`Packages installed in ${seconds(began)}.`);
}

/** Whether node_modules holds what package-lock.json names, by the record that npm keeps there. */
function isInstalled() {
  try {
    const packagesOf = (file) => JSON.parse(readFileSync(path.join(ROOT, file), 'utf8')).packages;
    const wanted = Object.entries(packagesOf('package-lock.json'));
    const there = packagesOf('node_modules/.package-lock.json');
    return wanted.every(
      ([place, { version, optional, devOptional, peer }]) =>
        place === '' ||
        there[place]?.version === version ||
        (!there[place] && Boolean(optional || devOptional || peer)),
    );
  } catch {
    return false;
  }
}

async function whyNotInstalled(code) {
  if (code === 127) return 'npm was not found. Install Node with npm, then run this again.';
  const missing = [];
  for (const tool of ['python3', 'make', 'c++'])
    if ((await run(tool, ['--version'], { quiet: 'always' })).code === 127) missing.push(tool);
  if (missing.length > 0)
    return `The packages could not be installed: the database has to be compiled here, and ${missing.join(', ')} is missing. Install a compiler (Debian: apt-get install build-essential python3), then run this again.`;
  return 'The packages could not be installed; npm says why above. Check the network, then run this again.';
}

const SOURCES = {
  app: [
    'src',
    'shared',
    'assets',
    'angular.json',
    'ngsw-config.json',
    'package.json',
    'tsconfig.json',
    'tsconfig.app.json',
  ],
  server: ['api', 'shared', 'package.json'],
};

/** Builds the application and the server where their sources have changed since. */
export async function ensureBuilt({ force = false, only } = {}) {
  if (!only || only === 'app')
    await build('app', 'the application', force, () =>
      runTool('@angular/cli', ['build', '--progress=false'], {
        quiet: true,
        env: { NG_CLI_ANALYTICS: 'false' },
      }),
    );
  if (!only || only === 'server')
    await build('server', 'the server', force, () => {
      rmSync(path.join(ROOT, 'dist/server'), { recursive: true, force: true });
      return runTool('typescript', ['-p', 'api/tsconfig.json'], { quiet: true });
    });
}

async function build(name, words, force, make) {
  const stamp = stampOf(SOURCES[name]);
  const file = `dist/.${name}-built`;
  if (!force && !isStale(file, stamp)) return;
  const began = Date.now();
  console.log(`Building ${words} …`);
  const { code } = await make();
  if (code !== 0) throw new CannotGoOn(`Building ${words} failed; the compiler says why above.`);
  remember(file, stamp);
  console.log(`Built ${words} in ${seconds(began)}.`);
}

/** A folder for the data that can be written to. */
export function checkFolder(dataDir) {
  try {
    makeFolder(dataDir);
    accessSync(dataDir, constants.W_OK);
    const probe = path.join(dataDir, `.probe-${process.pid}`);
    writeFileSync(probe, '');
    rmSync(probe);
  } catch {
    throw new CannotGoOn(
      `The folder ${dataDir} cannot be written to. Give this user the right to, or name another one by DATA_DIR, then run this again.`,
    );
  }
}

/** Step by step: Node's own recursive way never ends where a folder refuses children (/proc). */
function makeFolder(folder) {
  if (existsSync(folder)) return;
  makeFolder(path.dirname(folder));
  mkdirSync(folder);
}

/**
 * A port that nobody has.
 *
 * @param command what was typed, for the hint: "npm start"
 */
export function checkPort(port, command) {
  const example = `PORT=4290 ${command}`;
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.on('error', (error) =>
      reject(
        new CannotGoOn(
          error.code === 'EACCES'
            ? `This user may not open port ${port}. Name another one by PORT, for example ${example}.`
            : `Port ${port} is taken by another program. Stop that, or name another one by PORT, for example ${example}.`,
        ),
      ),
    );
    probe.listen(port, process.env.HOST?.trim() || '0.0.0.0', () => probe.close(() => resolve()));
  });
}

/** PORT as a number; empty is absent, as the server has it. 0: any free one. */
export function portSetting() {
  const given = process.env.PORT?.trim() || '4280';
  if (!/^\d+$/.test(given) || Number(given) > 65_535)
    throw new CannotGoOn(
      `PORT is ${given}; it has to be a whole number from 1 to 65535, or 0 for any free one.`,
    );
  return Number(given);
}
