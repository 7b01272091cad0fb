import { useWatch } from "react-hook-form";
import { CASE_CLASSIFICATIONS } from "../../../../shared/vocabulary.ts";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { fieldWords } from "../../../lib/form-errors.ts";
import { classificationWords } from "../../../lib/words.ts";
import { useSettings } from "../form/settings-desk.ts";
import { SETTING_NOTES } from "../setting-notes.ts";
import { CRITERIA, criteriaWords } from "../setting-words.ts";

/** What each class of case asks for, as a small table of boxes. */
export function CaseRulesEditor() {
  const { register, control, formState } = useSettings();
  const rules = useWatch({ control, name: "caseRules" });
  const open = CASE_CLASSIFICATIONS.filter((one) => CRITERIA.every((each) => !rules[one][each]));
  const error = fieldWords(formState.errors.caseRules?.message);
  const { label, does } = SETTING_NOTES.caseRules;
  return (
    <div>
      <ScrollRegion label="Rules by class, table">
        <Table
          caption={
            <>
              <strong className="text-ink">{label}</strong> <span className="block">{does}</span>
            </>
          }
        >
          <thead>
            <tr>
              <HeadCell>class</HeadCell>
              {CRITERIA.map((criterion) => (
                <HeadCell key={criterion}>{criteriaWords[criterion]}</HeadCell>
              ))}
            </tr>
          </thead>
          <tbody>
            {CASE_CLASSIFICATIONS.map((one) => (
              <tr key={one}>
                <HeadCell scope="row" className="whitespace-nowrap">
                  {classificationWords[one]}
                </HeadCell>
                {CRITERIA.map((criterion) => (
                  <Cell key={criterion}>
                    <label className="inline-flex min-h-7 min-w-7 items-center">
                      <input type="checkbox" {...register(`caseRules.${one}.${criterion}`)} />
                      <span className="sr-only">
                        {classificationWords[one]} asks for {criteriaWords[criterion]}
                      </span>
                    </label>
                  </Cell>
                ))}
              </tr>
            ))}
          </tbody>
        </Table>
      </ScrollRegion>
      {error ? (
        <p className="mt-1 text-sm text-coral">
          <span className="font-bold">Check: </span>
          {error}
        </p>
      ) : null}
      {open.map((one) => (
        <p key={one} className="mt-1 text-sm text-ochre">
          With nothing ticked, nobody meets the rule of a {classificationWords[one]}.
        </p>
      ))}
    </div>
  );
}
