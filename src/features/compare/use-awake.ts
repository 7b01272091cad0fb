import { useCallback, useState } from "react";

/**
 * Whether wheel and drag work on a picture that can be moved: only after a press on it and until
 * the pointer goes elsewhere. Otherwise whoever scrolls down the page would be caught in it.
 */
export function useAwake(): [boolean, (element: HTMLElement | null) => void] {
  const [awake, setAwake] = useState(false);
  const frame = useCallback((element: HTMLElement | null) => {
    if (!element) return;
    const onPress = ({ target, pointerType }: PointerEvent) => {
      const inside = target instanceof Node && element.contains(target);
      // A finger that only scrolls past presses too; it wakes the picture by a tap, see below.
      if (!inside || pointerType === "mouse") setAwake(inside);
    };
    const onTap = () => setAwake(true);
    const onLeave = ({ pointerType }: PointerEvent) => {
      if (pointerType === "mouse") setAwake(false);
    };
    document.addEventListener("pointerdown", onPress);
    element.addEventListener("click", onTap);
    element.addEventListener("pointerleave", onLeave);
    return () => {
      document.removeEventListener("pointerdown", onPress);
      element.removeEventListener("click", onTap);
      element.removeEventListener("pointerleave", onLeave);
    };
  }, []);
  return [awake, frame];
}
