import { Injectable, type MessageEvent } from '@nestjs/common';
import { filter, interval, map, merge, Subject, type Observable } from 'rxjs';
import type { RunState } from '../runs/run.states.js';

/** Something that happened in a lab, for those who look at it right now. `onlyFor` keeps it to one person. */
export interface LabEvent {
  labId: string;
  type: 'run';
  data: { id: string; state: RunState; progress: number };
  onlyFor?: string;
}

/** Proxies close streams that stay silent longer. */
const KEEP_ALIVE_MS = 15_000;

@Injectable()
export class EventsService {
  private readonly events = new Subject<LabEvent>();

  publish(event: LabEvent): void {
    this.events.next(event);
  }

  /** Events of a lab as one of its members may see them. */
  stream(labId: string, userId: string): Observable<MessageEvent> {
    const seen = this.events.pipe(
      filter((event) => event.labId === labId && (event.onlyFor === undefined || event.onlyFor === userId)),
      map(({ type, data }): MessageEvent => ({ type, data })),
    );
    return merge(seen, interval(KEEP_ALIVE_MS).pipe(map((): MessageEvent => ({ type: 'alive', data: '' }))));
  }
}
