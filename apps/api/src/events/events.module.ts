import { Controller, Global, Module, Sse, UseGuards, type MessageEvent } from '@nestjs/common';
import { ApiParam, ApiTags } from '@nestjs/swagger';
import type { Observable } from 'rxjs';
import { Can, InLab, LabGuard, type LabContext } from '../policy/lab.guard.js';
import { EventsService } from './events.service.js';

@ApiTags('events')
@ApiParam({ name: 'labId' })
@UseGuards(LabGuard)
@Controller('labs/:labId/events')
class EventsController {
  constructor(private readonly events: EventsService) {}

  @Sse()
  @Can('run.list')
  stream(@InLab() { labId, userId }: LabContext): Observable<MessageEvent> {
    return this.events.stream(labId, userId);
  }
}

@Global()
@Module({ controllers: [EventsController], providers: [EventsService], exports: [EventsService] })
export class EventsModule {}
