/** The settings as boxes: label, unit and why they are asked. */
export const SETTING_FIELDS = [
  {
    key: "populationAtRisk",
    label: "Population at risk",
    unit: "people",
    hint: "Everybody who could have been met, on record or not. Blank: not declared.",
    blank: true,
  },
  {
    key: "infectiousBefore",
    label: "Infectious window, before onset",
    unit: "days",
    hint: "Day of onset counts as day 0.",
    blank: false,
  },
  {
    key: "infectiousAfter",
    label: "Infectious window, after onset",
    unit: "days",
    hint: "Ends earlier when isolation begins earlier.",
    blank: false,
  },
  {
    key: "monitoringDays",
    label: "Monitoring period",
    unit: "days",
    hint: "Counted from the day after the last exposure.",
    blank: false,
  },
] as const;

export type SettingKey = (typeof SETTING_FIELDS)[number]["key"];
