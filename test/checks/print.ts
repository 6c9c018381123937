/** Prints a simulation's figures among the results of the run. */
export function print(line: string): void {
  process.stdout.write(`${line}\n`);
}
