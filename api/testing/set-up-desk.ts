import type { Changed, RecordedChange, SetUp } from '../../shared/contract/set-up.js';
import type { SignedInActor, TestPersonKey, TestServer } from './test-server.js';

type Method = 'post' | 'patch' | 'delete';

/** A manager at the office, as set-up's specs speak with the server. */
export interface SetUpDesk {
  readonly actor: SignedInActor;
  /** The whole mill as set-up shows it. */
  read(): Promise<SetUp>;
  /** Changes something; throws where the server says no. Gives the ids. */
  change(method: Method, path: string, body?: object): Promise<string[]>;
  /** Asks for something that is refused: the code, and the marked fields with their messages. */
  refused(
    method: Method,
    path: string,
    body?: object,
  ): Promise<{ code: string; fields: Record<string, string> }>;
  /** The record of changes, newest first. */
  record(query?: Record<string, string>): Promise<RecordedChange[]>;
}

export async function setUpDesk(server: TestServer, who: TestPersonKey = 'manager'): Promise<SetUpDesk> {
  const actor = await server.signInAs(who);
  const ask = (method: Method, path: string, body?: object) =>
    server.call(method, `/set-up${path}`, { as: actor, ...(body && { body }) });
  return {
    actor,
    read: async () => {
      const answer = await server.call('get', '/set-up', { as: actor });
      if (answer.status !== 200) throw new Error(answer.text);
      return answer.body as SetUp;
    },
    change: async (method, path, body) => {
      const answer = await ask(method, path, body);
      if (answer.status !== 200) throw new Error(`${method} ${path}: ${answer.text}`);
      return (answer.body as Changed).ids;
    },
    refused: async (method, path, body) => {
      const answer = await ask(method, path, body);
      if (answer.status === 200) throw new Error(`${method} ${path} was taken: ${answer.text}`);
      const { code, fields = [] } = answer.body as {
        code: string;
        fields?: { path: string; message: string }[];
      };
      return { code, fields: Object.fromEntries(fields.map((one) => [one.path, one.message])) };
    },
    record: async (query) => {
      const answer = await server.call('get', '/set-up/changes', { as: actor, ...(query && { query }) });
      if (answer.status !== 200) throw new Error(answer.text);
      return answer.body.changes as RecordedChange[];
    },
  };
}
