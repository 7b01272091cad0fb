import { Link } from "react-router-dom";
import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { paths } from "../../../app/paths.ts";
import { Answer } from "../../../components/ui/answer.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { formatDay, formatNumber } from "../../../lib/formatters.ts";
import { settingWords, wordFor } from "../../../lib/words.ts";
import { PersonLabel } from "./person-label.tsx";

export type PairTableProps = { person: PersonPage; investigationId: string };

const heads = ["who", "setting", "place", "first exposure", "last exposure"] as const;

/** The contact pairs of a person, one line for each telling. */
export function PairTable({ person, investigationId }: PairTableProps) {
  if (person.pairs.length === 0) {
    return (
      <EmptyState title="No contact pairs on record">
        Pairs come from interviews and from imported lists.
      </EmptyState>
    );
  }
  const named = person.pairs.some((pair) => pair.name);
  return (
    <>
      <ScrollRegion label="Table of contact pairs" className="max-h-[60vh]">
        <Table caption={`Contact pairs of ${person.studyNumber}`} hideCaption>
          <thead className="sticky top-0 bg-paper">
            <tr>
              {heads.map((head) => (
                <HeadCell key={head}>{head}</HeadCell>
              ))}
              <HeadCell numeric>minutes</HeadCell>
              <HeadCell numeric>distance, m</HeadCell>
              <HeadCell>touched</HeadCell>
              <HeadCell>indoors</HeadCell>
            </tr>
          </thead>
          <tbody>
            {person.pairs.flatMap((pair) =>
              (pair.exposures.length > 0 ? pair.exposures : [null]).map((exposure, index) => (
                <tr key={exposure?.id ?? pair.pairId}>
                  <HeadCell scope="row" className="whitespace-nowrap align-baseline">
                    <Link
                      to={paths.person(investigationId, pair.personId)}
                      className="underline decoration-rule underline-offset-4 hover:decoration-kelp"
                    >
                      <PersonLabel person={pair} />
                    </Link>
                    {named && index === 0 && pair.name ? (
                      <span className="ms-2">{pair.name}</span>
                    ) : null}
                  </HeadCell>
                  <Cell>
                    <Answer
                      value={exposure?.setting}
                      format={(code) => wordFor(settingWords, String(code))}
                    />
                  </Cell>
                  <Cell className="whitespace-nowrap">
                    <Answer value={exposure?.place} />
                  </Cell>
                  <Cell className="whitespace-nowrap">
                    <Answer
                      value={exposure?.firstExposure}
                      format={(day) => formatDay(String(day))}
                    />
                  </Cell>
                  <Cell className="whitespace-nowrap">
                    <Answer
                      value={exposure?.lastExposure}
                      format={(day) => formatDay(String(day))}
                    />
                  </Cell>
                  <Cell numeric>
                    <Answer value={exposure?.minutes} format={whole} />
                  </Cell>
                  <Cell numeric>
                    <Answer value={exposure?.distanceM} format={metres} />
                  </Cell>
                  <Cell>
                    <Answer value={exposure?.physical} />
                  </Cell>
                  <Cell>
                    <Answer value={exposure?.indoors} />
                  </Cell>
                </tr>
              )),
            )}
          </tbody>
        </Table>
      </ScrollRegion>
      <Caution className="mt-2">
        These are contacts people told us about; a line shows contact, not infection. Do not tell a
        contact who the case is.
      </Caution>
    </>
  );
}

const whole = (value: string | number) => formatNumber(Number(value));
const metres = (value: string | number) =>
  formatNumber(Number(value), { decimals: Number.isInteger(Number(value)) ? 0 : 1 });
