import 'reflect-metadata';
import { writeFileSync } from 'node:fs';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { AppModule } from './app.module.js';
import { openApiDocument } from './docs.js';

/** Writes the OpenAPI document to the file named on the command line, without a database: nothing is started. */
const [file] = process.argv.slice(2);
if (!file) throw new Error('Name the file to write.');
const app = await NestFactory.create<NestExpressApplication>(AppModule, { preview: true, logger: ['error'] });
app.setGlobalPrefix('api');
writeFileSync(file, `${JSON.stringify(openApiDocument(app), null, 2)}\n`);
