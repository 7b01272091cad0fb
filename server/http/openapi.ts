import { z } from "zod";
import { ROLES } from "../../shared/roles.ts";
import type { AnyRoute, PlainRoute } from "./route.ts";

function schemaOf(schema: z.ZodType, io: "input" | "output"): unknown {
  return z.toJSONSchema(schema, { io, unrepresentable: "any", target: "draft-2020-12" });
}

function parameters(path: string, query: z.ZodType | undefined): unknown[] {
  const out: unknown[] = [...path.matchAll(/:(\w+)/g)].map((match) => ({
    name: match[1],
    in: "path",
    required: true,
    schema: { type: "string", format: "uuid" },
  }));
  if (query instanceof z.ZodObject) {
    for (const [name, schema] of Object.entries(query.shape)) {
      out.push({
        name,
        in: "query",
        required: false,
        schema: schemaOf(schema as z.ZodType, "input"),
      });
    }
  }
  return out;
}

/** What a route answers with: nothing, a file, or JSON. */
function contentOf(status: number, sendsFile: boolean, output: z.ZodType): object {
  if (status === 204) return {};
  if (sendsFile) return { content: { "text/csv": { schema: { type: "string" } } } };
  return { content: { "application/json": { schema: schemaOf(output, "output") } } };
}

const PROBLEM = { $ref: "#/components/responses/Problem" };

/**
 * The OpenAPI 3.1 document, made from the manifest and the contracts; `x-roles` lists the acting
 * roles that have a route.
 */
export function openApiDocument(
  routes: readonly AnyRoute[],
  plain: readonly PlainRoute[],
): unknown {
  const paths: Record<string, Record<string, unknown>> = {};
  const all = [
    ...plain.map((route) => ({
      ...route,
      roles: Array.isArray(route.access) ? (route.access as readonly string[]) : ROLES,
      open: route.access === "public",
      upload: false,
      sendsFile: false,
    })),
    ...routes.map((route) => ({
      ...route,
      roles: route.policy,
      open: false,
      upload: route.upload === true,
    })),
  ];
  for (const route of all) {
    const path = route.path.replace(/:(\w+)/g, "{$1}");
    const output =
      typeof route.output === "function" ? route.output(route.roles[0] as never) : route.output;
    const status = route.status ?? (route.creates ? 201 : 200);
    const operation: Record<string, unknown> = {
      summary: route.summary,
      "x-roles": route.roles,
      ...(route.open ? { security: [] } : {}),
      parameters: [
        ...parameters(route.path, route.query as z.ZodType | undefined),
        ...(route.creates
          ? [
              {
                name: "Idempotency-Key",
                in: "header",
                required: true,
                schema: { type: "string", format: "uuid" },
              },
            ]
          : []),
      ],
      responses: {
        [status]: {
          description: "Done",
          ...contentOf(status, route.sendsFile === true, output),
        },
        default: PROBLEM,
      },
    };
    if (route.upload) {
      operation.requestBody = {
        required: true,
        content: {
          "multipart/form-data": {
            schema: {
              type: "object",
              required: ["kind", "file"],
              properties: {
                kind: { type: "string", enum: ["people", "pairs"] },
                file: { type: "string", contentMediaType: "text/csv" },
              },
            },
          },
        },
      };
    } else if (route.body) {
      operation.requestBody = {
        required: true,
        content: { "application/json": { schema: schemaOf(route.body as z.ZodType, "input") } },
      };
    }
    paths[path] = { ...paths[path], [route.method]: operation };
  }
  return {
    openapi: "3.1.0",
    info: { title: "Strandline", version: "1" },
    security: [{ session: [] }],
    paths,
    components: {
      securitySchemes: { session: { type: "apiKey", in: "cookie", name: "strandline" } },
      responses: {
        Problem: {
          description: "A problem (RFC 9457): codes and paths, never a value",
          content: { "application/problem+json": { schema: { type: "object" } } },
        },
      },
    },
  };
}
