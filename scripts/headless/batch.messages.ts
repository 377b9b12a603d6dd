import type { Form } from './write.js';

/** One pair of a folder, as paths. */
export interface BatchJob {
  name: string;
  system: string;
  experiment: string;
  out: string;
  form: Form;
}

export interface BatchReply {
  name: string;
  exitCode: number;
  /** What goes to standard error. */
  lines: string[];
}
