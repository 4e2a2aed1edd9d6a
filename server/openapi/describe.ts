import { z } from "zod";
import { Problem } from "../../shared/contracts/problem.ts";
import { OPERATIONS, type Operation } from "./operations.ts";

/** A contract as JSON Schema; its own `$id` makes its inner references resolve inside it rather than at the document's root. */
const schemaOf = (name: string, schema: z.ZodType, io: "input" | "output") => ({
  $id: `urn:perhundred:schemas:${name.replaceAll(/[^a-z]+/gi, "-")}-${io}`,
  ...z.toJSONSchema(schema, { io, unrepresentable: "any", target: "draft-2020-12" }),
});

function describeOperation({ method, path, summary, body, answer, status }: Operation) {
  const name = `${method}${path}`;
  const parameters = [...path.matchAll(/:(\w+)/g)].map(([, name]) => ({
    name,
    in: "path",
    required: true,
    schema: { type: "string" },
  }));
  return {
    summary,
    parameters,
    ...(body
      ? { requestBody: { required: true, content: { "application/json": { schema: schemaOf(name, body, "input") } } } }
      : {}),
    responses: {
      [String(status ?? 200)]: {
        description: "Done.",
        ...(answer ? { content: { "application/json": { schema: schemaOf(name, answer, "output") } } } : {}),
      },
      default: {
        description: "What went wrong (RFC 9457).",
        content: { "application/problem+json": { schema: schemaOf(`${name}-problem`, Problem, "output") } },
      },
    },
  };
}

/** The API as an OpenAPI 3.1 document, for analysts who script against it. */
export function describeApi(serverUrl: string) {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const operation of OPERATIONS) {
    const path = operation.path.replace(/:(\w+)/g, "{$1}");
    (paths[path] ??= {})[operation.method] = describeOperation(operation);
  }
  return {
    openapi: "3.1.0",
    info: {
      title: "Perhundred",
      version: "1",
      description:
        "Sign in with POST /session, keep the cookie, and send the answer's csrfToken as the header x-csrf-token with every change.",
    },
    servers: [{ url: `${serverUrl}/api` }],
    paths,
  };
}
