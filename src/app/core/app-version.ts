/** The application's version, as package.json has it; each tablet says it, so that the manager sees who lags behind. */
export const APP_VERSION = '0.1.0';
