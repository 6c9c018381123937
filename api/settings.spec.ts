import { resolve } from 'node:path';
import { BadSetting, readSettings } from './settings.js';

describe('settings', () => {
  it('are complete without any', () => {
    expect(readSettings({})).toEqual({
      port: 4280,
      host: '0.0.0.0',
      dataDir: resolve('data'),
      appDir: resolve('dist/app/browser'),
      tls: null,
      publicOrigins: [],
      trustProxy: 0,
      logLevel: 'info',
      backupHour: 2,
      backupsKept: 14,
    });
  });

  it('are as absent where they are empty, but for APP_DIR', () => {
    expect(readSettings({ PORT: '', HOST: ' ', DATA_DIR: '', LOG_LEVEL: '', TRUST_PROXY: '' })).toEqual(
      readSettings({}),
    );
  });

  it('are read from the environment', () => {
    expect(
      readSettings({
        PORT: '0',
        HOST: '127.0.0.1',
        DATA_DIR: '/srv/shedbeat',
        APP_DIR: '',
        TLS_CERT: '/srv/cert.pem',
        TLS_KEY: '/srv/key.pem',
        PUBLIC_ORIGIN: 'https://Shedbeat.example/, http://mill:8080',
        TRUST_PROXY: '1',
        LOG_LEVEL: 'warn',
        BACKUP_HOUR: 'off',
        BACKUPS_KEPT: '3',
      }),
    ).toEqual({
      port: 0,
      host: '127.0.0.1',
      dataDir: '/srv/shedbeat',
      appDir: null,
      tls: { cert: '/srv/cert.pem', key: '/srv/key.pem' },
      publicOrigins: ['https://shedbeat.example', 'http://mill:8080'],
      trustProxy: 1,
      logLevel: 'warn',
      backupHour: null,
      backupsKept: 3,
    });
  });

  it.each([
    [{ PORT: 'abc' }, 'PORT=abc is not a whole number from 0 to 65535.'],
    [{ PORT: '70000' }, 'PORT=70000 is not a whole number from 0 to 65535.'],
    [{ PORT: '-1' }, 'PORT=-1 is not a whole number from 0 to 65535.'],
    [{ PORT: '80.5' }, 'PORT=80.5 is not a whole number from 0 to 65535.'],
    [{ TRUST_PROXY: 'yes' }, 'TRUST_PROXY=yes is not a whole number from 0 to 10.'],
    [{ TLS_CERT: '/srv/cert.pem' }, 'TLS_CERT is set but TLS_KEY is not: HTTPS needs both files.'],
    [{ TLS_KEY: '/srv/key.pem' }, 'TLS_KEY is set but TLS_CERT is not: HTTPS needs both files.'],
    [{ PUBLIC_ORIGIN: 'mill' }, 'PUBLIC_ORIGIN=mill is not an address such as https://shedbeat.example.'],
    [{ LOG_LEVEL: 'loud' }, 'LOG_LEVEL=loud is none of fatal, error, warn, info, debug, trace, silent.'],
  ])('say what is wrong: %o', (env, sentence) => {
    expect(() => readSettings(env)).toThrow(BadSetting);
    expect(() => readSettings(env)).toThrow(sentence);
  });
});
