import { lazy, Suspense, useRef, useState } from "react";
import { useNavigate } from "react-router-dom";
import { paths } from "../../../app/paths.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import type { NetworkQuestion } from "../../../lib/network-summary-query.ts";
import { RunList } from "./run-list.tsx";

// With the form library, which the room does without until somebody asks for a comparison.
const RunForm = lazy(() =>
  import("./run-form.tsx").then(({ RunForm: form }) => ({ default: form })),
);

export type ComparisonsSectionProps = {
  investigationId: string;
  timeZone: string;
  /** What the page is about; a new comparison starts from it. */
  question: NetworkQuestion;
};

/** Comparisons with random networks: those asked for so far, and a new one. */
export function ComparisonsSection({
  investigationId,
  timeZone,
  question,
}: ComparisonsSectionProps) {
  const [asking, setAsking] = useState(false);
  const opener = useRef<HTMLButtonElement>(null);
  const navigate = useNavigate();
  return (
    <Section
      title="Comparisons"
      subLine="the network on record against networks in which chance decides"
      actions={
        <Button
          ref={opener}
          aria-expanded={asking}
          onClick={() => setAsking((current) => !current)}
        >
          New comparison
        </Button>
      }
    >
      {asking ? (
        <Suspense fallback={<LoadingState label="Opening the form" rows={4} />}>
          <RunForm
            investigationId={investigationId}
            question={question}
            onClose={() => {
              setAsking(false);
              // The button that was pressed is gone with the form; the keyboard goes on where it came from.
              opener.current?.focus();
            }}
            onAsked={(runId) => void navigate(paths.compareRun(investigationId, runId))}
          />
        </Suspense>
      ) : null}
      <RunList investigationId={investigationId} timeZone={timeZone} />
    </Section>
  );
}
