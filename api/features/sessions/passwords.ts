/** Hashing and comparing of passwords and PINs, off the main thread. */
export interface Passwords {
  /** bcrypt, cost ≥ 10. Throws `password-too-long` over 72 bytes. */
  hash(secret: string): Promise<string>;
  /**
   * Against null (nobody of that name, no PIN set) it does the same work and answers false, so that the time taken
   * tells nothing. Throws `password-too-long` over 72 bytes.
   */
  compare(secret: string, hash: string | null): Promise<boolean>;
  close(): Promise<void>;
}
