import { Cancelled } from './engine-client.ts';

interface Waiting<Ask, Answer> {
  readonly ask: Ask;
  readonly resolve: (answer: Answer) => void;
  readonly reject: (reason: unknown) => void;
}

/**
 * Sends one question at a time and of those that come meanwhile only the newest; the others are rejected as `Cancelled`.
 * So a slider never leaves a queue behind it.
 */
export class NewestOnly<Ask, Answer> {
  readonly #send: (ask: Ask) => Promise<Answer>;
  #isBusy = false;
  #waiting: Waiting<Ask, Answer> | null = null;

  constructor(send: (ask: Ask) => Promise<Answer>) {
    this.#send = send;
  }

  ask(ask: Ask): Promise<Answer> {
    return new Promise((resolve, reject) => {
      this.#waiting?.reject(new Cancelled('a newer question took its place'));
      this.#waiting = { ask, resolve, reject };
      if (!this.#isBusy) void this.#work();
    });
  }

  async #work(): Promise<void> {
    this.#isBusy = true;
    for (let next = this.#waiting; next; next = this.#waiting) {
      this.#waiting = null;
      try {
        next.resolve(await this.#send(next.ask));
      } catch (error) {
        next.reject(error);
      }
    }
    this.#isBusy = false;
  }
}
