import { useState } from "react";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { useSession } from "../../../lib/session-context.ts";
import { ResetPracticeDialog } from "./reset-practice-dialog.tsx";

export type PracticeSectionProps = {
  investigationId: string;
  name: string;
  /** Version of the settings that are on screen. */
  version: number;
};

/** What practising means, and the way to start over. */
export function PracticeSection(props: PracticeSectionProps) {
  const { actingRole } = useSession();
  const [asking, setAsking] = useState(false);
  return (
    <Section title="To practise with">
      <p>
        Everything here is invented. It may be emptied at any time, sends nothing, and counts
        nowhere.
      </p>
      {actingRole === "supervisor" ? (
        <p className="mt-3">
          <Button variant="danger" onClick={() => setAsking(true)}>
            Empty and fill anew
          </Button>
        </p>
      ) : (
        <p className="mt-1 text-sm text-ink-2">A supervisor can empty it and fill it anew.</p>
      )}
      {asking ? <ResetPracticeDialog {...props} onClose={() => setAsking(false)} /> : null}
    </Section>
  );
}
