import type { JournalPort } from '../app/ports.ts';
import type { InterruptionCode, Recording } from '../core/model/recording.ts';
import type { SampleBuffer } from './sample-buffer.ts';

/** How often samples go to the journal, ms: with the write itself a crash costs well under 2 s. */
export const JOURNAL_PERIOD_MS = 1000;
/** How long the end of a recording waits for the journal: a database that hangs must not hold back the samples, ms. */
const PATIENCE_MS = 3000;

/** Writes what is recorded to the journal, in order, one write at a time; failing costs the journal, not the recording. */
export class JournalWriter {
  readonly #journal: JournalPort;
  readonly #buffer: SampleBuffer;
  readonly #onFailed: () => void;
  readonly #originS: number;
  readonly #id: Promise<string | undefined>;
  #queue: Promise<void> = Promise.resolve();
  #next: number;
  #sequence = 0;
  #hasFailed = false;

  constructor(
    journal: JournalPort,
    buffer: SampleBuffer,
    from: number,
    meta: Pick<Recording, 'startedAt' | 'sensor' | 'axes'>,
    onFailed: () => void,
  ) {
    this.#journal = journal;
    this.#buffer = buffer;
    this.#onFailed = onFailed;
    this.#next = from;
    this.#originS = from < buffer.count ? buffer.timeAt(from) : 0;
    this.#id = journal.begin(meta).catch(() => this.#failed());
  }

  /** Hand over what came since the last call, up to sample `to`. */
  write(to = this.#buffer.count): void {
    if (to <= this.#next) return;
    const chunk = this.#buffer.slice(this.#next, to, this.#originS);
    const sequence = this.#sequence;
    this.#next = to;
    this.#sequence += 1;
    this.#later((id) => this.#journal.append(id, sequence, chunk.timeS, chunk.accelerationMps2));
  }

  flag(code: InterruptionCode): void {
    this.#later((id) => this.#journal.flag(id, code));
  }

  /** Name of the journal once all is written, or '' when there is none. */
  async ended(): Promise<string> {
    const written = this.#queue.then(() => this.#id);
    const late = new Promise<undefined>((resolve) => {
      setTimeout(() => resolve(undefined), PATIENCE_MS);
    });
    return (await Promise.race([written, late])) ?? '';
  }

  #later(work: (id: string) => Promise<void>): void {
    this.#queue = this.#queue.then(async () => {
      const id = await this.#id;
      if (id === undefined || this.#hasFailed) return;
      await work(id).catch(() => this.#failed());
    });
  }

  #failed(): undefined {
    if (!this.#hasFailed) this.#onFailed();
    this.#hasFailed = true;
  }
}
