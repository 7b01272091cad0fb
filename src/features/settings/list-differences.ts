import {
  DEFAULT_SYMPTOMS,
  type SettingKey,
  settingTexts,
  symptomList,
} from "../../../shared/contracts/settings.ts";
import { languageName } from "./language-name.ts";
import { joined, textKindWords } from "./setting-words.ts";

function symptomDifferences(from: unknown, to: unknown): string[] | null {
  const before = symptomList.safeParse(from ?? DEFAULT_SYMPTOMS);
  const after = symptomList.safeParse(to ?? DEFAULT_SYMPTOMS);
  if (!before.success || !after.success) return null;
  const old = new Map(before.data.map(({ code, label }) => [code, label]));
  const now = new Map(after.data.map(({ code, label }) => [code, label]));
  const lines: string[] = [];
  const added = [...now].filter(([code]) => !old.has(code)).map(([, label]) => label);
  const removed = [...old].filter(([code]) => !now.has(code)).map(([, label]) => label);
  if (added.length > 0) lines.push(`added ${joined(added)}`);
  for (const [code, label] of now) {
    const was = old.get(code);
    if (was !== undefined && was !== label) lines.push(`renamed ${was} to ${label}`);
  }
  if (removed.length > 0) lines.push(`removed ${joined(removed)}`);
  const kept = (list: Iterable<string>, other: Map<string, string>) =>
    [...list].filter((code) => other.has(code)).join(" ");
  if (kept(old.keys(), now) !== kept(now.keys(), old)) lines.push("put in another order");
  return lines;
}

function textDifferences(from: unknown, to: unknown): string[] | null {
  const before = settingTexts.safeParse(from ?? []);
  const after = settingTexts.safeParse(to ?? []);
  if (!before.success || !after.success) return null;
  const name = ({ kind, language }: { kind: "advice" | "consent"; language: string }) =>
    `${textKindWords[kind]} in ${languageName(language)}`;
  const old = new Map(before.data.map((one) => [name(one), one.text]));
  const now = new Map(after.data.map((one) => [name(one), one.text]));
  const lines: string[] = [];
  for (const [which, text] of now) {
    const was = old.get(which);
    if (was === undefined) lines.push(`added: ${which}`);
    else if (was !== text) lines.push(`worded anew: ${which}`);
  }
  for (const which of old.keys()) if (!now.has(which)) lines.push(`removed: ${which}`);
  return lines;
}

/** What changed inside a list setting, line by line; null for a setting that is no list. */
export function listDifferences(setting: SettingKey, from: unknown, to: unknown): string[] | null {
  if (setting === "symptoms") return symptomDifferences(from, to);
  if (setting === "texts") return textDifferences(from, to);
  return null;
}
