import { Global, Module } from '@nestjs/common';
import { readSettings } from './settings.js';

/** Token under which the checked settings are injected. */
export const SETTINGS = Symbol('settings');

@Global()
@Module({ providers: [{ provide: SETTINGS, useFactory: () => readSettings() }], exports: [SETTINGS] })
export class SettingsModule {}
