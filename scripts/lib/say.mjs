/** A sentence for whoever ran a command that cannot go on. */
export class CannotGoOn extends Error {}

/** Runs a command's main part; what cannot go on is one sentence and exit code 1, never a stack. */
export async function main(work) {
  try {
    await work();
  } catch (error) {
    if (!(error instanceof CannotGoOn)) throw error;
    console.error(`\n${error.message}\n`);
    process.exitCode = 1;
  }
}

export function seconds(sinceMs) {
  return `${((Date.now() - sinceMs) / 1000).toFixed(1)} s`;
}
