import * as book from './book.entities.js';
import * as identity from './identity.entities.js';
import * as mail from './mail.entities.js';
import * as mill from './mill.entities.js';
import * as setUp from './set-up.entities.js';
import * as shift from './shift.entities.js';
import * as tackling from './tackling.entities.js';

export * from './book.entities.js';
export * from './identity.entities.js';
export * from './mail.entities.js';
export * from './mill.entities.js';
export * from './set-up.entities.js';
export * from './shift.entities.js';
export * from './tackling.entities.js';

/** Every entity of the database, for the data source. */
export const ENTITIES = [book, identity, mail, mill, setUp, shift, tackling].flatMap((module) =>
  Object.values(module),
);
