import { serveJobs } from "../worker-lane.ts";
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

serveJobs<Job>((job) =>
  job.kind === "report"
    ? answerReport(job.snapshot, job.question)
    : answerPicture(job.snapshot, job.question),
);
