import { parentPort, Worker } from "node:worker_threads";

type Waiting = { resolve: (answer: never) => void; reject: (error: Error) => void };
type Message<J> = { readonly id: number; readonly job: J };
type Reply =
  | { readonly id: number; readonly answer: unknown }
  | { readonly id: number; readonly failure: string };

/**
 * One worker thread that runs jobs in turn, so that no long piece of work holds up the event loop.
 * It starts with the first job and is made anew after a crash (whose jobs fail). `Answers` says by
 * the kind of a job what it answers.
 */
export class WorkerLane<Job extends { readonly kind: keyof Answers }, Answers> {
  readonly #script: URL;
  readonly #name: string;
  #worker: Worker | null = null;
  #waiting = new Map<number, Waiting>();
  #next = 1;

  /** @param script JavaScript that loads the jobs: a worker cannot be started on TypeScript itself */
  constructor(script: URL, name: string) {
    this.#script = script;
    this.#name = name;
  }

  /** Starts the thread before there is work for it. */
  warm(): void {
    this.#start().unref();
  }

  /** Runs a job. @throws Error when the job fails or the worker dies */
  run<J extends Job>(job: J): Promise<Answers[J["kind"]]> {
    const worker = this.#start();
    const id = this.#next++;
    const message: Message<J> = { id, job };
    return new Promise((resolve, reject) => {
      this.#waiting.set(id, { resolve: resolve as (answer: never) => void, reject });
      // A thread without work must not keep the process alive.
      worker.ref();
      worker.postMessage(message);
    });
  }

  /** Ends the thread; running jobs fail. */
  async stop(): Promise<void> {
    await this.#worker?.terminate();
  }

  #start(): Worker {
    if (this.#worker) return this.#worker;
    const worker = new Worker(this.#script, { name: this.#name });
    this.#worker = worker;
    worker.on("message", (reply: Reply) => {
      const waiting = this.#waiting.get(reply.id);
      this.#waiting.delete(reply.id);
      if (this.#waiting.size === 0) worker.unref();
      if ("failure" in reply) waiting?.reject(new Error(reply.failure));
      else waiting?.resolve(reply.answer as never);
    });
    worker.on("error", (error) => this.#lose(worker, error));
    worker.on("exit", () => this.#lose(worker, new Error(`the ${this.#name} worker ended`)));
    return worker;
  }

  #lose(worker: Worker, error: Error): void {
    if (this.#worker !== worker) return;
    this.#worker = null;
    const waiting = [...this.#waiting.values()];
    this.#waiting.clear();
    for (const { reject } of waiting) reject(error);
  }
}

/** In the worker: answers each job of the lane with what `run` returns, or its failure. */
export function serveJobs<Job>(run: (job: Job) => unknown): void {
  parentPort?.on("message", ({ id, job }: Message<Job>) => {
    let reply: Reply;
    try {
      reply = { id, answer: run(job) };
    } catch (error) {
      reply = { id, failure: error instanceof Error ? error.message : String(error) };
    }
    parentPort?.postMessage(reply);
  });
}
