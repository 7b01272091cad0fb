import { type FieldPath, useFormContext } from "react-hook-form";
import type { CheckedInterview } from "../form/interview-resolver.ts";
import type { InterviewValues } from "../form/interview-values.ts";
import { readDay } from "../form/read-box.ts";
import { useFormSurroundings } from "./form-context.ts";

type Path = FieldPath<InterviewValues>;

/** The form of an interview, typed. */
export function useInterviewForm() {
  return useFormContext<InterviewValues, unknown, CheckedInterview>();
}

/** Registering and setting the boxes that contact rows and group rows share. */
export function useExposureBoxes(list: "contacts" | "groupExposures", row: number) {
  const form = useInterviewForm();
  const { today, places } = useFormSurroundings();
  const path = (box: string) => `${list}.${row}.${box}` as Path;
  const text = (box: string) => String(form.getValues(path(box)) ?? "");

  function set(box: string, value: string) {
    form.setValue(path(box), value, {
      shouldDirty: true,
      shouldTouch: true,
      shouldValidate: form.formState.isSubmitted,
    });
  }

  return {
    path,
    text,
    set,
    register: (box: string) => form.register(path(box)),
    /** A day box: what was typed is read when the box is left. */
    registerDay: (box: "firstExposure" | "lastExposure") =>
      form.register(path(box), {
        onBlur: () => {
          const typed = text(box);
          const before = box === "lastExposure" ? text("firstExposure") : undefined;
          const read = readDay(typed, today, before);
          if (read !== typed) set(box, read);
        },
      }),
    /** A place box: a place on record brings its setting along when none was given. */
    registerPlace: () =>
      form.register(path("place"), {
        onChange: () => places.lookUp(text("place"), text("setting")),
        onBlur: () => {
          const place = places.find(text("place"), text("setting"));
          if (place?.setting && text("setting") === "") set("setting", place.setting);
        },
      }),
  };
}
