import { useEffect, useState } from "react";
import type { Match } from "../../../../shared/contracts/people.ts";
import { findMatches } from "../api/interview-api.ts";

const pauseMs = 250;
const leastName = 3;
const leastDigits = 5;
const words = new Set(["unknown", "refused"]);

/**
 * People already on record for what is being typed in one row, once the typing rests. What was
 * found stays only as long as the row asks; it is kept in no cache.
 */
export function useMatches(
  investigationId: string,
  name: string,
  phone: string,
  enabled: boolean,
): readonly Match[] {
  const [found, setFound] = useState<readonly Match[]>([]);
  const askedName =
    enabled && name.trim().length >= leastName && !words.has(name) ? name.trim() : "";
  const digits = phone.replace(/\D/g, "").length;
  const askedPhone = enabled && digits >= leastDigits ? phone.trim() : "";

  useEffect(() => {
    if (askedName === "" && askedPhone === "") {
      setFound([]);
      return;
    }
    const stop = new AbortController();
    const timer = setTimeout(() => {
      const typed = {
        ...(askedName ? { name: askedName } : {}),
        ...(askedPhone ? { phone: askedPhone } : {}),
      };
      findMatches(investigationId, typed, stop.signal)
        .then((items) => {
          if (!stop.signal.aborted) setFound(items);
        })
        .catch(() => {
          // No answer means nothing is offered: the row is saved as typed, as without a match.
          if (!stop.signal.aborted) setFound([]);
        });
    }, pauseMs);
    return () => {
      clearTimeout(timer);
      stop.abort();
    };
  }, [investigationId, askedName, askedPhone]);

  return found;
}
