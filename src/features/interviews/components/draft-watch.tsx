import { useEffect, useRef } from "react";
import { useWatch } from "react-hook-form";
import type { InterviewValues } from "../form/interview-values.ts";
import { useInterviewForm } from "./use-exposure-boxes.ts";

/** Tells of every change of the form, without drawing the form again. */
export function DraftWatch({ onChange }: { onChange: (values: InterviewValues) => void }) {
  const form = useInterviewForm();
  const values = useWatch({ control: form.control });
  const text = JSON.stringify(values);
  const last = useRef(text);
  useEffect(() => {
    if (last.current === text) return;
    last.current = text;
    onChange(JSON.parse(text) as InterviewValues);
  }, [text, onChange]);
  return null;
}
