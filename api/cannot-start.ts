/** Why the server (or a command on its data) cannot start: the message is one sentence that says what to do. */
export class CannotStart extends Error {}
