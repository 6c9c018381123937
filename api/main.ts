import { CannotStart } from './cannot-start.js';
import { BadSetting, readSettings } from './settings.js';
import { startServer, type RunningServer } from './start-server.js';

/** Starts the server from the environment, and ends it properly on SIGTERM and Ctrl+C. */
async function main(): Promise<void> {
  const settings = readSettings(process.env);
  const server = await startServer(settings);
  endOnSignals(server);
  console.log(`Shedbeat is at ${server.url} (data in ${settings.dataDir}).`);
  if (server.firstRunCode !== null)
    console.log(
      `This mill has no manager yet. Open ${server.url}/first-run and give this one-time code: ${server.firstRunCode}`,
    );
}

function endOnSignals(server: RunningServer): void {
  const end = (signal: NodeJS.Signals): void => {
    console.log(`${signal}: closing down; what is being written is finished first.`);
    server.close().then(
      () => process.exit(0),
      (error: unknown) => {
        console.error(error);
        process.exit(1);
      },
    );
  };
  process.once('SIGTERM', end);
  process.once('SIGINT', end);
}

main().catch((error: unknown) => {
  if (error instanceof CannotStart || error instanceof BadSetting) console.error(error.message);
  else console.error(error);
  process.exit(1);
});
