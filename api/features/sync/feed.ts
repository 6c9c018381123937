/** The live feed's hub: says "something after N" to whoever listens for a shed, or for the whole mill. */
export interface Feed {
  /** Tells listeners of the shed (null: all) that the change table has reached `seq`. */
  announce(shedId: string | null, seq: number): void;
  /** Listens until the returned function is called. `sessionId`: ended with it; null: a tablet with nobody signed in. */
  listen(listener: FeedListener): () => void;
  /** Ends the streams of a session, a device, or (no argument) all. */
  end(of?: { sessionId?: string; deviceId?: string }): void;
}

export interface FeedListener {
  readonly shedIds: readonly string[] | null;
  readonly sessionId: string | null;
  readonly deviceId: string | null;
  send(seq: number): void;
  close(): void;
}
