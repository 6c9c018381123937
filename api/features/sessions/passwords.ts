/** Hashing and comparing of passwords and PINs, off the main thread. */
export interface Passwords {
  /** bcrypt, cost ≥ 10. Throws `password-too-long` over 72 bytes. */
  hash(secret: string): Promise<string>;
  compare(secret: string, hash: string): Promise<boolean>;
  close(): Promise<void>;
}
