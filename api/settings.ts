/** Every setting of the server, read in one place. */
export interface Settings {
  /** PORT, 4280. 0: any free one. */
  readonly port: number;
  /** HOST, 0.0.0.0. */
  readonly host: string;
  /** DATA_DIR, ./data: the SQLite file, the secret, later photos, mail, backups. */
  readonly dataDir: string;
  /** Built application to serve; null: none (tests). */
  readonly appDir: string | null;
  /** TLS_CERT, TLS_KEY: files; both or none. */
  readonly tls: { readonly cert: string; readonly key: string } | null;
  /** PUBLIC_ORIGIN: the address people use, where a proxy stands before the server. */
  readonly publicOrigins: readonly string[];
  /** TRUST_PROXY: how many proxies stand before the server, 0. */
  readonly trustProxy: number;
  /** LOG_LEVEL, info. */
  readonly logLevel: string;
}
