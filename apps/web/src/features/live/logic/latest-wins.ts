/** The part of a Worker that is used here. */
export interface WorkerLike<Request> {
  postMessage(request: Request): void;
  terminate(): void;
  onmessage: ((event: { data: never }) => void) | null;
  onerror: ((event: unknown) => void) | null;
}

/** How long an overtaken computation may still run, ms: shorter ones are cheaper to wait for than a new worker is to start. */
const PATIENCE = 150;

/**
 * Sends requests to a worker one at a time. Of those that come while it works only the latest is kept; work that is
 * overtaken and takes longer than `PATIENCE` is stopped with its worker; shorter work ends and is shown, so that a drag
 * shows every picture that is ready.
 */
export class LatestWins<Request, Reply> {
  private worker: WorkerLike<Request> | null = null;
  private busySince: number | null = null;
  private waiting: { request: Request } | null = null;
  private timer: ReturnType<typeof setTimeout> | undefined;

  constructor(
    private readonly createWorker: () => WorkerLike<Request>,
    private readonly onReply: (reply: Reply, request: Request) => void,
    private readonly onFailure: (request: Request) => void,
    private readonly now: () => number = () => performance.now(),
  ) {}

  send(request: Request): void {
    if (this.busySince === null) {
      this.start(request);
      return;
    }
    this.waiting = { request };
    clearTimeout(this.timer);
    this.timer = setTimeout(() => this.overtake(), Math.max(0, PATIENCE - (this.now() - this.busySince)));
  }

  close(): void {
    clearTimeout(this.timer);
    this.worker?.terminate();
    this.worker = null;
    this.waiting = null;
    this.busySince = null;
  }

  private start(request: Request): void {
    this.busySince = this.now();
    this.worker ??= this.createWorker();
    this.worker.onmessage = ({ data }) => {
      this.onReply(data, request);
      this.next();
    };
    this.worker.onerror = () => {
      this.onFailure(request);
      this.overtake();
    };
    this.worker.postMessage(request);
  }

  private overtake(): void {
    this.worker?.terminate();
    this.worker = null;
    this.next();
  }

  private next(): void {
    clearTimeout(this.timer);
    this.busySince = null;
    const next = this.waiting;
    this.waiting = null;
    if (next) this.start(next.request);
  }
}
