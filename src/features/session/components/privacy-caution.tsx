import { Caution } from "../../../components/ui/caution.tsx";

/** What every reader of records is told, on every page that may show one. */
export function PrivacyCaution() {
  return (
    <Caution>
      Do not tell a contact who the case is. Open only the records you need; views are logged.
    </Caution>
  );
}
