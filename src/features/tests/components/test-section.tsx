import { useQuery } from "@tanstack/react-query";
import { lazy, Suspense, useState } from "react";
import { Section } from "../../../components/layouts/section.tsx";
import { Answer } from "../../../components/ui/answer.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatCount, formatDay } from "../../../lib/formatters.ts";
import { testsQuery } from "../api/list-tests.ts";

// Most pages are read only; the form comes when it is asked for.
const TestForm = lazy(() => import("./test-form.tsx").then((file) => ({ default: file.TestForm })));

export type TestSectionProps = {
  investigationId: string;
  personId: string;
  today: string;
  /** The record's `can.addTest`. */
  canAdd: boolean;
};

const day = (value: string | number) => formatDay(String(value));

/** The tests of a person, and a form for one more where the record allows it. */
export function TestSection({ investigationId, personId, today, canAdd }: TestSectionProps) {
  const tests = useQuery(testsQuery(investigationId, personId));
  const [adding, setAdding] = useState(false);
  return (
    <Section
      title="Tests"
      subLine={tests.data ? formatCount(tests.data.total, "test", "tests") : undefined}
      actions={
        canAdd && !adding ? (
          <Button size="small" onClick={() => setAdding(true)}>
            Add a test
          </Button>
        ) : null
      }
    >
      {tests.isPending ? <LoadingState label="Loading tests" rows={1} /> : null}
      {tests.isError ? (
        <ErrorState kind={errorKind(tests.error)} onRetry={() => void tests.refetch()} />
      ) : null}
      {tests.data?.items.length === 0 ? <p className="text-ink-2">No test on record.</p> : null}
      {tests.data && tests.data.items.length > 0 ? (
        <ScrollRegion label="Table of tests">
          <Table caption="Tests" hideCaption>
            <thead>
              <tr>
                <HeadCell>specimen</HeadCell>
                <HeadCell>kind</HeadCell>
                <HeadCell>result</HeadCell>
                <HeadCell>day of result</HeadCell>
              </tr>
            </thead>
            <tbody>
              {tests.data.items.map((test) => (
                <tr key={test.id}>
                  <HeadCell scope="row">
                    <Answer value={test.specimenDate} format={day} />
                  </HeadCell>
                  <Cell>
                    <Answer value={test.kind} />
                  </Cell>
                  <Cell pending={test.result === "pending" || test.result === null}>
                    {test.result ?? "not known yet"}
                  </Cell>
                  <Cell>
                    <Answer value={test.resultDate} format={day} />
                  </Cell>
                </tr>
              ))}
            </tbody>
          </Table>
        </ScrollRegion>
      ) : null}
      {adding ? (
        <Suspense fallback={<LoadingState label="Opening the form" />}>
          <TestForm {...{ investigationId, personId, today }} onDone={() => setAdding(false)} />
        </Suspense>
      ) : null}
    </Section>
  );
}
