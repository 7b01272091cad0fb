import { useQueryClient } from "@tanstack/react-query";
import { type RefObject, useEffect, useRef, useState } from "react";
import { useNavigate } from "react-router-dom";
import type { InterviewInput } from "../../../../shared/contracts/interviews.ts";
import type { InterviewOutcome } from "../../../../shared/vocabulary.ts";
import { paths } from "../../../app/paths.ts";
import { useToast } from "../../../components/ui/use-toast.ts";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { formatNumber } from "../../../lib/formatters.ts";
import { investigationKey } from "../../../lib/query-keys.ts";
import { postInterview } from "../api/interview-api.ts";
import type { DraftKeeper } from "../draft/draft-keeper.ts";
import { freshDraft } from "../form/draft-body.ts";
import type { CheckedInterview } from "../form/interview-resolver.ts";
import { boxPath, type Sendable } from "../form/to-input.ts";
import { counted } from "../form/words.ts";
import { useInterviewForm } from "./use-exposure-boxes.ts";

/** After these the server keeps the draft: what was half typed is still wanted. */
const nobodyReached: readonly InterviewOutcome[] = ["attempted", "unreachable"];
const inFlightTries = 5;
const inFlightPauseMs = 700;

export interface SubmitOptions {
  investigationId: string;
  personId: string;
  keeper: DraftKeeper;
  submitKey: RefObject<string>;
}

/** Sends with one key; the same request still being worked on is waited for. */
async function send(investigationId: string, input: InterviewInput, key: string) {
  for (let left = inFlightTries; ; left--) {
    try {
      return await postInterview(investigationId, input, key);
    } catch (error) {
      const waiting = error instanceof ApiError && error.code === "in_flight" && left > 1;
      if (!waiting) throw error;
      await new Promise((resolve) => setTimeout(resolve, inFlightPauseMs));
    }
  }
}

/** What was recorded, in one sentence for the short message. */
export function receiptWords(input: InterviewInput, graphVersion: number): string {
  const contacts = input.contacts.length;
  const groups = input.groupExposures.length;
  if (contacts + groups === 0 && nobodyReached.includes(input.outcome)) {
    return "Attempt recorded: nobody was reached this time.";
  }
  const told = [
    counted(contacts, "contact"),
    ...(groups > 0 ? [`${counted(groups, "group")} not named`] : []),
  ].join(" and ");
  return `Interview recorded with ${told}: graph version ${formatNumber(graphVersion)}; the group follows in a moment.`;
}

/** Records the interview once, puts errors beside their boxes, and goes back to the person. */
export function useSubmitInterview({
  investigationId,
  personId,
  keeper,
  submitKey,
}: SubmitOptions) {
  const form = useInterviewForm();
  const toast = useToast();
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const [sending, setSending] = useState(false);
  // Two presses within one drawing both see the state of before; this one they share.
  const busy = useRef(false);
  const [done, setDone] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);

  // A turn later: by then the page knows that nothing is unsaved, and does not ask before leaving.
  useEffect(() => {
    if (!done) return;
    const turn = setTimeout(() => void navigate(paths.person(investigationId, personId)));
    return () => clearTimeout(turn);
  }, [done, navigate, investigationId, personId]);

  function showErrors(error: unknown, sent: Sendable) {
    if (error instanceof ApiError && error.code === "key_reused") {
      submitKey.current = crypto.randomUUID();
      return setProblem(
        "This form reached the server before, with other content, and that was recorded. Look at the person's page; recording again makes a second interview.",
      );
    }
    if (!(error instanceof ApiError) || error.code !== "invalid") {
      return setProblem(`Not recorded: ${errorWords(error)}. Everything typed is still here.`);
    }
    const errors = error.errors.map(({ path, code }) => ({ path: boxPath(path, sent), code }));
    const onForm = new ApiError(error.status, error.code, { errors });
    const others = showFieldErrors(onForm, form.setError, isBox);
    const rest = others.flatMap((code) => fieldWords(code) ?? []);
    setProblem(["Not recorded: some boxes need another look", ...rest].join("; ").concat("."));
  }

  async function submit({ input, sent }: CheckedInterview) {
    if (busy.current || done) return;
    busy.current = true;
    setSending(true);
    setProblem(null);
    await keeper.hold();
    try {
      const { graphVersion } = await send(investigationId, input, submitKey.current);
      const rows = input.contacts.length + input.groupExposures.length;
      if (rows === 0 && nobodyReached.includes(input.outcome)) {
        // A bare attempt leaves the draft standing, with a key that has now been used.
        await keeper.saveLast(freshDraft("")).catch(() => {});
      }
      keeper.finish();
      for (const word of ["people", "follow-up", "interviews", "groups", "network"] as const) {
        void queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, word) });
      }
      toast({ text: receiptWords(input, graphVersion), tone: "done" });
      setDone(true);
    } catch (error) {
      keeper.release();
      showErrors(error, sent);
    } finally {
      busy.current = false;
      setSending(false);
    }
  }

  return { submit, sending, done, problem, setProblem };
}

/** Paths that have a box of their own on the page. */
function isBox(path: string): boolean {
  return (
    ["outcome", "channel", "heldAt"].includes(path) ||
    /^contacts\.\d+\.[a-zA-Z]+$/.test(path) ||
    /^groupExposures\.\d+\.(setting|place|firstExposure|lastExposure|count)$/.test(path)
  );
}
