import { accessWords } from "../safeguard-words.ts";
import { AccessWord } from "./access-word.tsx";

/** What the four words of the policy table mean. */
export function PolicyLegend() {
  return (
    <dl className="mb-5 grid gap-x-8 gap-y-1 text-sm sm:grid-cols-2">
      {Object.entries(accessWords).map(([access, meaning]) => (
        <div key={access} className="flex items-baseline gap-3">
          <dt className="w-20 shrink-0">
            <AccessWord access={access} />
          </dt>
          <dd className="text-ink-2">{meaning}</dd>
        </div>
      ))}
    </dl>
  );
}
