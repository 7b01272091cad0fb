import { Caution } from "../../../components/ui/caution.tsx";

/** The general caution: on the sign-in page and at the foot of every page. */
export function GeneralCaution() {
  return (
    <Caution>
      Decision support for authorised public-health staff. Not medical advice, not a diagnosis.
      Follow your jurisdiction’s public-health law, orders and licensed professional judgement;
      where they differ from this screen, they prevail.
    </Caution>
  );
}
