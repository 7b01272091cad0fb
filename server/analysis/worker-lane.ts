import { Worker } from "node:worker_threads";
import type { Job, JobAnswer, JobMessage, JobReply } from "./analysis-jobs.ts";

type Waiting = { resolve: (answer: never) => void; reject: (error: Error) => void };

/** Loads the job file: a worker cannot be started on TypeScript itself. */
const SCRIPT = new URL("./analysis-worker.mjs", import.meta.url);

/**
 * One worker thread that runs analysis jobs in turn, so that no figure holds up the event loop. It
 * starts with the first job and is made anew after a crash (whose jobs fail).
 */
export class WorkerLane {
  #worker: Worker | null = null;
  #waiting = new Map<number, Waiting>();
  #next = 1;

  /** Starts the thread before there is work for it. */
  warm(): void {
    this.#start().unref();
  }

  /** Runs a job. @throws Error when the job fails or the worker dies */
  run<J extends Job>(job: J): Promise<JobAnswer[J["kind"]]> {
    const worker = this.#start();
    const id = this.#next++;
    const message: JobMessage = { id, job };
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
    const worker = new Worker(SCRIPT, { name: "analysis" });
    this.#worker = worker;
    worker.on("message", (reply: JobReply) => {
      const waiting = this.#waiting.get(reply.id);
      this.#waiting.delete(reply.id);
      if (this.#waiting.size === 0) worker.unref();
      if ("failure" in reply) waiting?.reject(new Error(reply.failure));
      else waiting?.resolve(reply.answer as never);
    });
    worker.on("error", (error) => this.#lose(worker, error));
    worker.on("exit", () => this.#lose(worker, new Error("the analysis worker ended")));
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
