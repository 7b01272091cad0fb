import { useQuery } from "@tanstack/react-query";
import { hasDuty } from "../../../../shared/roles.ts";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatNumber } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { useSession } from "../../../lib/session-context.ts";
import { settingsQuery } from "../api/get-settings.ts";
import { ChangeHistory } from "../components/change-history.tsx";
import { PracticeSection } from "../components/practice-section.tsx";
import { SettingsForm } from "../components/settings-form.tsx";

const parts = [
  ["investigation", "The investigation"],
  ["case-definition", "Case definition"],
  ["windows", "Windows"],
  ["follow-up", "Follow-up"],
  ["clusters", "Clusters"],
  ["exposure", "Exposure grading"],
  ["small-numbers", "Small numbers"],
  ["texts", "Texts"],
  ["history", "History of changes"],
] as const;

/** The settings of the investigation: everybody may read, supervisor and data officer change. */
export function Component() {
  const { id, name } = useInvestigation();
  const { actingRole } = useSession();
  const settings = useQuery(settingsQuery(id));
  const readOnly = !hasDuty(actingRole, "changeSettings");
  // Who changed what is no business of the doorstep; the server says the same.
  const seesHistory = actingRole !== "tracer";
  const { data } = settings;
  return (
    <RoomPage
      title="Settings"
      subLine={data ? `${name} · version ${formatNumber(data.version)} of the settings` : name}
    >
      {settings.isPending ? <LoadingState label="Loading the settings" rows={8} /> : null}
      {settings.isError && !data ? (
        <ErrorState kind={errorKind(settings.error)} onRetry={() => void settings.refetch()} />
      ) : null}
      {data ? (
        <>
          <Caution className="mb-3">
            Local public-health law, orders and guidance decide these values. Published examples are
            given to compare with, never as advice.
            {readOnly ? " Supervisors and data officers change them; you can read them." : ""}
          </Caution>
          <nav aria-label="Parts of the settings" className="mb-5" data-print="hide">
            <ul className="flex flex-wrap gap-x-5 gap-y-1 text-sm">
              {parts
                .filter(([part]) => part !== "history" || seesHistory)
                .map(([part, words]) => (
                  <li key={part}>
                    <a
                      href={`#${part}`}
                      className="inline-flex min-h-6 items-center text-kelp underline decoration-1 underline-offset-4"
                    >
                      {words}
                    </a>
                  </li>
                ))}
            </ul>
          </nav>
          {data.practice ? (
            <PracticeSection investigationId={id} name={data.name} version={data.version} />
          ) : null}
          <SettingsForm investigationId={id} saved={data} readOnly={readOnly} />
          {seesHistory ? (
            <div id="history" className="scroll-mt-4 border-t border-ink pt-3">
              <Section title="History of changes">
                <ChangeHistory />
              </Section>
            </div>
          ) : null}
        </>
      ) : null}
    </RoomPage>
  );
}
