import { parentPort } from "node:worker_threads";
import { answerPicture, type PictureAnswer, type PictureQuestion } from "./answer-picture.ts";
import { answerReport, type ReportAnswer } from "./answer-report.ts";
import type { GraphSnapshot } from "./graph-store.ts";
import type { ReportQuestion } from "./report-question.ts";

/** Work for a worker. */
export type Job =
  | { readonly kind: "report"; readonly snapshot: GraphSnapshot; readonly question: ReportQuestion }
  | {
      readonly kind: "picture";
      readonly snapshot: GraphSnapshot;
      readonly question: PictureQuestion;
    };

/** Answer to each kind of job. */
export type JobAnswer = { report: ReportAnswer; picture: PictureAnswer };

export type JobMessage = { readonly id: number; readonly job: Job };
export type JobReply =
  | { readonly id: number; readonly answer: ReportAnswer | PictureAnswer }
  | { readonly id: number; readonly failure: string };

function run(job: Job): ReportAnswer | PictureAnswer {
  return job.kind === "report"
    ? answerReport(job.snapshot, job.question)
    : answerPicture(job.snapshot, job.question);
}

parentPort?.on("message", ({ id, job }: JobMessage) => {
  let reply: JobReply;
  try {
    reply = { id, answer: run(job) };
  } catch (error) {
    reply = { id, failure: error instanceof Error ? error.message : String(error) };
  }
  parentPort?.postMessage(reply);
});
