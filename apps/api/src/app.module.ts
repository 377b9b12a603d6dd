import { Module } from '@nestjs/common';
import { ThrottlerModule } from '@nestjs/throttler';
import { TypeOrmModule } from '@nestjs/typeorm';
import { AccountModule } from './account/account.module.js';
import { AuthModule } from './auth/auth.module.js';
import { SETTINGS, SettingsModule } from './config/settings.module.js';
import type { Settings } from './config/settings.js';
import { dataSourceOptions } from './database/data-source.js';
import { HealthModule } from './health/health.module.js';
import { InvitationsModule } from './invitations/invitations.module.js';
import { LabsModule } from './labs/labs.module.js';
import { MailModule } from './mail/mail.module.js';
import { MembersModule } from './members/members.module.js';
import { BriefsModule } from './briefs/briefs.module.js';
import { SeriesModule } from './series/series.module.js';
import { DemoModule } from './demo/demo.module.js';
import { EventsModule } from './events/events.module.js';
import { NuclidesModule } from './nuclides/nuclides.module.js';
import { RunsModule } from './runs/runs.module.js';
import { SystemsModule } from './systems/systems.module.js';
import { TodayModule } from './today/today.module.js';
import { PolicyModule } from './policy/policy.module.js';

@Module({
  imports: [
    SettingsModule,
    TypeOrmModule.forRootAsync({
      inject: [SETTINGS],
      useFactory: (settings: Settings) => ({
        ...dataSourceOptions(settings.databaseUrl),
        retryAttempts: 3,
        retryDelay: 1000,
      }),
    }),
    // Sign-in and password reset: ten tries a minute from one address.
    ThrottlerModule.forRoot([{ ttl: 60_000, limit: 10 }]),
    PolicyModule,
    MailModule,
    AuthModule,
    AccountModule,
    LabsModule,
    MembersModule,
    InvitationsModule,
    EventsModule,
    NuclidesModule,
    SystemsModule,
    RunsModule,
    BriefsModule,
    SeriesModule,
    TodayModule,
    DemoModule,
    HealthModule,
  ],
})
export class AppModule {}
