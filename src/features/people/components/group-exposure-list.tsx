import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { formatDay } from "../../../lib/formatters.ts";
import { settingWords, wordFor } from "../../../lib/words.ts";
import { countWords } from "../strip-rows.ts";

/** People met who could not be named: counted apart, no pairs of the network. */
export function GroupExposureList({ groups }: { groups: PersonPage["groupExposures"] }) {
  return (
    <ul className="border-t border-rule">
      {groups.map((group) => (
        <li key={group.id} className="border-b border-rule py-1.5">
          {countWords(group.countMin, group.countMax)} people,{" "}
          {group.place ??
            (group.setting ? wordFor(settingWords, group.setting) : "place not asked")}
          <span className="text-ink-2">
            {" "}
            · {formatDay(group.firstExposure)}
            {group.lastExposure && group.lastExposure !== group.firstExposure
              ? ` to ${formatDay(group.lastExposure)}`
              : ""}
          </span>
        </li>
      ))}
    </ul>
  );
}
