import { createContext, useContext, useEffect } from "react";

/** Up to when the figures of a page hold, and of which graph. */
export interface CutOff {
  /** ISO instant. */
  cutOff: string;
  graphVersion: number;
  /** A newer version is on its way: "as of version N−1, updating". */
  updating?: boolean;
}

/** Set by a page, shown in the header. */
export const CutOffContext = createContext<(cutOff: CutOff | null) => void>(() => {});

/** Says in the header up to when this page's figures hold; null leaves the frame's own words. */
export function useCutOff(value: CutOff | null): void {
  const show = useContext(CutOffContext);
  const cutOff = value?.cutOff;
  const graphVersion = value?.graphVersion;
  const updating = value?.updating ?? false;
  useEffect(() => {
    show(
      cutOff === undefined || graphVersion === undefined
        ? null
        : { cutOff, graphVersion, updating },
    );
  }, [show, cutOff, graphVersion, updating]);
  useEffect(() => () => show(null), [show]);
}
