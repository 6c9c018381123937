import { Buffer } from 'node:buffer';
import { spawn } from 'node:child_process';
import { createRequire } from 'node:module';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

export const ROOT = fileURLToPath(new URL('../../', import.meta.url));

/**
 * Runs a program in the project's folder with this terminal; answers its exit code. `quiet`: its output is shown only
 * if it fails (`'always'`: never).
 */
export function run(command, args, { env = {}, quiet = false } = {}) {
  return new Promise((resolve) => {
    const child = spawn(command, args, {
      cwd: ROOT,
      env: { ...process.env, ...env },
      stdio: quiet ? ['ignore', 'pipe', 'pipe'] : 'inherit',
    });
    const output = [];
    child.stdout?.on('data', (data) => output.push(data));
    child.stderr?.on('data', (data) => output.push(data));
    child.on('error', () => resolve({ code: 127, output: `${command} was not found.` }));
    child.on('close', (code) => {
      const text = Buffer.concat(output).toString();
      if (quiet === true && code !== 0) process.stdout.write(text);
      resolve({ code: code ?? 1, output: text });
    });
  });
}

/** Runs a tool of node_modules by this Node. */
export function runTool(name, args, options) {
  const require = createRequire(pathToFileURL(path.join(ROOT, 'package.json')));
  const found = require.resolve(`${name}/package.json`);
  const { bin } = require(found);
  const file = typeof bin === 'string' ? bin : (bin[name.split('/').pop()] ?? Object.values(bin)[0]);
  return run(process.execPath, [path.join(path.dirname(found), file), ...args], options);
}

/** Starts a server that stays; it ends with this command, and this command with it. */
export function stay(args, env) {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, args, {
      cwd: ROOT,
      env: { ...process.env, ...env },
      stdio: 'inherit',
    });
    const pass = (signal) => child.kill(signal);
    process.on('SIGINT', pass);
    process.on('SIGTERM', pass);
    child.on('close', (code) => resolve(code ?? 0));
  });
}
