import { useQuery } from "@tanstack/react-query";
import { useLocation, useParams } from "react-router-dom";
import { paths } from "../../../app/paths.ts";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatInstant } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { importQuery } from "../api/get-import.ts";
import { ImportForm } from "../components/import-form.tsx";
import { ImportList } from "../components/import-list.tsx";
import { ImportView } from "../components/import-view.tsx";
import { kindWords } from "../import-words.ts";

/** Importing a list: choosing a file, or one file that was checked (its id stands in the address). */
export function Component() {
  const { importId } = useParams();
  return importId ? <OneImport key={importId} importId={importId} /> : <NewImport />;
}

function NewImport() {
  const { id, timeZone } = useInvestigation();
  return (
    <RoomPage
      title="Import a list"
      subLine="People or contact pairs from a CSV file."
      actions={<LinkButton to={paths.trace(id)}>Trace</LinkButton>}
    >
      <Section title="A new file">
        <ImportForm investigationId={id} />
      </Section>
      <Section title="Files brought in">
        <ImportList investigationId={id} timeZone={timeZone} />
      </Section>
    </RoomPage>
  );
}

function OneImport({ importId }: { importId: string }) {
  const { id, timeZone } = useInvestigation();
  const location = useLocation();
  const found = useQuery(importQuery(id, importId));
  const one = found.data;
  const again = (location.state as { again?: boolean } | null)?.again === true;
  return (
    <RoomPage
      title={one ? `Import of ${kindWords[one.kind]}` : "Import"}
      subLine={one ? `brought ${formatInstant(one.recordedAt, timeZone)}` : undefined}
      actions={<LinkButton to={paths.imports(id)}>Another file</LinkButton>}
    >
      {one ? (
        <ImportView investigationId={id} timeZone={timeZone} one={one} again={again} />
      ) : found.isError ? (
        <ErrorState kind={errorKind(found.error)} onRetry={() => void found.refetch()} />
      ) : (
        <LoadingState label="Opening the import" rows={3} />
      )}
    </RoomPage>
  );
}
