import { z } from "zod";
import { listQuery } from "../../../shared/contracts/common.ts";
import {
  investigationAnswer,
  investigationPatch,
} from "../../../shared/contracts/investigations.ts";
import {
  caseDefinitionList,
  practiceReset,
  settingChangeList,
  settingsAnswer,
  settingsPatch,
  settingsPreview,
} from "../../../shared/contracts/settings.ts";
import { ROLES } from "../../../shared/roles.ts";
import { type AnyRoute, defineRoute } from "../../http/route.ts";
import { changeSettings } from "./commands/change-settings.ts";
import { resetPractice } from "./commands/reset-practice.ts";
import { presentInvestigation, presentSettings } from "./present.ts";
import { previewSettings } from "./preview/preview-settings.ts";
import { listCaseDefinitions, listSettingChanges, loadSettings } from "./settings-store.ts";
import { loadInvestigation } from "./store.ts";

const LEADERS = ["supervisor", "officer"] as const;
const params = z.object({ id: z.uuid() });
const pageQuery = listQuery.pick({ page: true, pageSize: true });

/** The settings of the acting investigation: read, previewed, changed, and how they came to be. */
export const settingsRoutes: AnyRoute[] = [
  defineRoute({
    method: "patch",
    path: "/api/investigations/:id",
    summary: "Change settings that the report stands on",
    policy: LEADERS,
    params,
    body: investigationPatch,
    output: investigationAnswer,
    async run({ tx, actor, body }) {
      await changeSettings(tx, actor, body);
      return presentInvestigation(await loadInvestigation(tx, actor.investigationId), [actor.role]);
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/settings",
    summary: "All settings in force, with the case definition",
    policy: ROLES,
    params,
    output: settingsAnswer,
    async run({ tx, actor }) {
      return presentSettings(await loadSettings(tx, actor.investigationId));
    },
  }),
  defineRoute({
    method: "patch",
    path: "/api/investigations/:id/settings",
    summary: "Change settings: only those given, under the version they were read at",
    policy: LEADERS,
    params,
    body: settingsPatch,
    output: settingsAnswer,
    async run({ tx, actor, body }) {
      return presentSettings(await changeSettings(tx, actor, body));
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/settings/preview",
    summary: "What a change of settings would move; nothing is stored",
    policy: LEADERS,
    params,
    body: settingsPatch,
    output: settingsPreview,
    isolation: "repeatable",
    run: ({ tx, actor, body }) => previewSettings(tx, actor, body),
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/settings/changes",
    summary: "Changes of the settings, the newest first",
    policy: ["supervisor", "officer", "epidemiologist"],
    params,
    query: pageQuery,
    output: settingChangeList,
    async run({ tx, actor, query }) {
      return { ...(await listSettingChanges(tx, actor.role, query)), ...query };
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/settings/case-definitions",
    summary: "Versions of the case definition, the newest first",
    policy: ROLES,
    params,
    query: pageQuery,
    output: caseDefinitionList,
    async run({ tx, query }) {
      return { ...(await listCaseDefinitions(tx, query)), ...query };
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/settings/practice-reset",
    summary: "Empty a practice investigation and fill it again; its name is sent to confirm",
    policy: ["supervisor"],
    params,
    body: practiceReset,
    output: settingsAnswer,
    async run({ tx, actor, services, body }) {
      return presentSettings(await resetPractice(tx, services.keys, actor, body));
    },
  }),
];
