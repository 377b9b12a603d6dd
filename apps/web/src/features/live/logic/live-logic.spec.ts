import { describe, expect, it, vi } from 'vitest';
import { LatestWins, type WorkerLike } from './latest-wins';

/** A worker whose answers the test releases. */
class FakeWorker implements WorkerLike<string> {
  asked: string[] = [];
  ended = false;
  onmessage: ((event: { data: never }) => void) | null = null;
  onerror: ((event: unknown) => void) | null = null;
  postMessage(request: string) {
    this.asked.push(request);
  }
  terminate() {
    this.ended = true;
  }
  answer() {
    this.onmessage?.({ data: `answer to ${this.asked.at(-1)}` as never });
  }
}

function setup() {
  vi.useFakeTimers();
  const workers: FakeWorker[] = [];
  const replies: string[] = [];
  const failed: string[] = [];
  const queue = new LatestWins<string, string>(
    () => {
      const worker = new FakeWorker();
      workers.push(worker);
      return worker;
    },
    (reply) => replies.push(reply),
    (request) => failed.push(request),
    () => Date.now(),
  );
  return { queue, workers, replies, failed };
}

describe('of the requests that come while the worker is busy', () => {
  it('only the latest is computed, after the one that runs', () => {
    const { queue, workers, replies } = setup();
    for (const request of ['a', 'b', 'c', 'd']) queue.send(request);
    workers[0].answer();
    workers[0].answer();
    expect(workers[0].asked).toEqual(['a', 'd']);
    expect(replies).toEqual(['answer to a', 'answer to d']);
    queue.close();
  });

  it('a slow one that is overtaken is stopped, a slow one that is not overtaken runs on', () => {
    const { queue, workers, replies } = setup();
    queue.send('slow');
    vi.advanceTimersByTime(5000);
    expect(workers[0].ended).toBe(false);
    queue.send('next');
    vi.advanceTimersByTime(1);
    expect(workers[0].ended).toBe(true);
    expect(workers[1].asked).toEqual(['next']);
    workers[1].answer();
    expect(replies).toEqual(['answer to next']);
    queue.close();
  });

  it('goes on with a new worker when one breaks', () => {
    const { queue, workers, failed } = setup();
    queue.send('a');
    queue.send('b');
    workers[0].onerror?.(new Error('broken'));
    expect(failed).toEqual(['a']);
    expect(workers[1].asked).toEqual(['b']);
    queue.close();
    expect(workers[1].ended).toBe(true);
  });
});
