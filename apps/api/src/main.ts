import 'reflect-metadata';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { AppModule } from './app.module.js';
import { SettingRefused, readSettings } from './config/settings.js';
import { configure } from './configure.js';

async function main(): Promise<void> {
  const { port, host } = readSettings();
  const app = await NestFactory.create<NestExpressApplication>(AppModule, {
    abortOnError: false,
    logger: ['warn', 'error'],
  });
  configure(app);
  await app.listen(port, host);
}

main().catch((error: unknown) => {
  const message = error instanceof Error ? error.message : String(error);
  const database = /ECONNREFUSED|ER_ACCESS_DENIED|ENOTFOUND|ETIMEDOUT/.test(message);
  if (error instanceof SettingRefused) process.stderr.write(`${message}\n`);
  else if (database)
    process.stderr.write(`The database does not answer (${message}). Is it running? See docker-free-db/README.md.\n`);
  else process.stderr.write(`The server could not start: ${message}\n`);
  process.exit(1);
});
