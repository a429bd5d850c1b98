import { email as emailSchema, personName } from '@stillroom/shared/contracts';
import { ConfigError, publicAddress, readConfig } from './config/index.ts';
import { createDataSource } from './database/data-source.ts';
import { entities } from './entities.ts';
import { DomainError } from './errors.ts';
import { validate } from './http/validate.ts';
import { makeOperator } from './modules/auth/index.ts';

/** `make-operator.js ADDRESS [NAME]`: run by `npm run operator`. */
try {
  const config = readConfig(process.env);
  const email = validate(emailSchema, process.argv[2]);
  const name = validate(personName, process.argv[3] ?? email);
  const database = await createDataSource({ url: config.DATABASE_URL, entities, pool: 4 }).initialize();
  try {
    const token = await database.transaction((manager) => makeOperator(manager, email, name));
    const words =
      token === null
        ? `${email} is operator now.`
        : `${email} has an account as operator. Set its password within an hour at ${publicAddress(config)}/new-password/${token}`;
    process.stdout.write(`${words}\n`);
  } finally {
    await database.destroy();
  }
} catch (error) {
  const known = error instanceof ConfigError || error instanceof DomainError;
  process.stderr.write(`${known ? error.message : String((error as Error).stack)}\n`);
  process.exit(1);
}
