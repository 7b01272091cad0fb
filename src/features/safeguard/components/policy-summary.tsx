import type { FieldPolicy } from "../../../../shared/contracts/safeguard.ts";
import { Notice } from "../../../components/ui/notice.tsx";
import { formatCount } from "../../../lib/formatters.ts";
import { disagreementWords } from "../policy-disagreements.ts";

/** The finding in one line, and what differs column by column when anything does. */
export function PolicySummary({ policy }: { policy: FieldPolicy }) {
  const differing = policy.items.filter((item) => !item.agrees);
  const all = formatCount(policy.items.length, "column", "columns");
  if (differing.length === 0) {
    return (
      <Notice tone="done" title="They agree." className="mb-5">
        Registry and PostgreSQL’s own catalogue say the same of all {all}, for all four roles.
      </Notice>
    );
  }
  return (
    <Notice
      tone="error"
      title={`${formatCount(differing.length, "column differs", "columns differ")}.`}
      className="mb-5"
    >
      The database does not do what the registry says. Restarting the server writes the registry’s
      rights anew; whatever still differs after that needs whoever looks after the database.
      <ul className="mt-2 grid gap-2">
        {differing.map((item) => (
          <li key={`${item.table}.${item.column}`}>
            <strong>
              {item.table}.{item.column}
            </strong>
            {disagreementWords(item).map((words) => (
              <span key={words} className="block">
                {words}
              </span>
            ))}
          </li>
        ))}
      </ul>
    </Notice>
  );
}
