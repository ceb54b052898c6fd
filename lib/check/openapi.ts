import { z } from "zod";
import { ClaimInput, ConventionsInput, keySchema } from "@/lib/key-files/key-schema";
import { VERDICTS } from "@/lib/verify/finding";
import { SLIPS, type SlipId } from "@/lib/verify/slips";
import { PointerError, REQUEST_LIMITS } from "./answer-key";

const Slip = z
  .object({
    causes: z
      .array(z.enum(Object.keys(SLIPS) as [SlipId, ...SlipId[]]))
      .meta({ description: "Slips that all give this value here." }),
    says: z.string().meta({ description: "The explanation in one sentence." }),
    certainty: z.enum(["likely", "possible"]),
  })
  .meta({ id: "Slip" });

const PublicFinding = z
  .object({
    ref: z.string(),
    quantity: z.string(),
    claimed: z.string(),
    verdict: z.enum(VERDICTS),
    exact: z
      .object({
        text: z.string().meta({ description: "Typed notation.", examples: ["sqrt(30)/15"] }),
        latex: z.string(),
        decimal: z
          .string()
          .meta({ description: "20 correct significant digits.", examples: ["0.36514837167011074230"] }),
      })
      .nullable()
      .meta({ description: "The recomputed value; null when nothing could be computed." }),
    slips: z.array(Slip).max(3),
    place: z
      .object({ file: z.string(), line: z.number().int(), column: z.number().int() })
      .nullable()
      .meta({ description: "Where the claim stands in its file; null over HTTP." }),
    reason: z.string().meta({ description: "What was found, as a sentence for people." }),
  })
  .meta({ id: "Finding" });

const count = z.number().int().min(0);
const Counts = z
  .object({
    ...(Object.fromEntries(VERDICTS.map((verdict) => [verdict, count])) as Record<
      (typeof VERDICTS)[number],
      typeof count
    >),
    total: count,
  })
  .meta({ id: "Summary", description: "How many claims got each verdict." });

/** The answer of POST /api/v1/check. */
export const CheckReport = z
  .object({ findings: z.array(PublicFinding), summary: Counts })
  .meta({ id: "CheckReport" });

/** RFC 9457 problem details, as every error answer carries them. */
export const ProblemDocument = z
  .object({
    type: z.string(),
    title: z.string(),
    status: z.number().int(),
    detail: z.string(),
    instance: z.string(),
    errors: z.array(PointerError).optional(),
  })
  .meta({ id: "Problem" });

/** The OpenAPI 3.1 description of /api/v1, made from the schemas that check the requests. */
export function openApi(): Record<string, unknown> {
  const { schemas } = z.toJSONSchema(registryOf(), {
    uri: (id) => `#/components/schemas/${id}`,
    io: "input",
  });
  const problem = (description: string, headers?: Record<string, unknown>) => ({
    description,
    ...(headers && { headers }),
    content: { "application/problem+json": { schema: { $ref: "#/components/schemas/Problem" } } },
  });
  return {
    openapi: "3.1.0",
    info: {
      title: "Surdmark",
      version: "1.0.0",
      summary: "Exact verification of angular-momentum coupling coefficients.",
      description: "It verifies values, not the physics or the wording of a problem.",
      license: { name: "Apache-2.0", identifier: "Apache-2.0" },
    },
    servers: [{ url: "/" }],
    security: [],
    paths: {
      "/api/v1/check": {
        post: {
          operationId: "checkKey",
          summary: "Verify an answer key",
          description: `Up to ${REQUEST_LIMITS.claims} claims and ${REQUEST_LIMITS.bytes / 1024} kB a request; entries up to j = ${REQUEST_LIMITS.largestJ} are worked out. The answer is the JSON of the command line.`,
          requestBody: {
            required: true,
            content: { "application/json": { schema: { $ref: "#/components/schemas/Key" } } },
          },
          responses: {
            "200": {
              description: "A finding for each claim.",
              content: { "application/json": { schema: { $ref: "#/components/schemas/CheckReport" } } },
            },
            "403": problem("The request came from another site."),
            "413": problem("The body is too large."),
            "422": problem("The body is not a key; `errors` points at each fault."),
            "429": problem("Too many requests from this address.", {
              "Retry-After": { description: "Seconds to wait.", schema: { type: "integer" } },
            }),
            "500": problem("A fault of the server, with a reference."),
          },
        },
      },
      "/api/v1/openapi.json": {
        get: {
          operationId: "describe",
          summary: "This description",
          responses: {
            "200": {
              description: "OpenAPI 3.1.",
              content: { "application/json": { schema: { type: "object" } } },
            },
          },
        },
      },
    },
    components: { schemas: withoutMeta(schemas) },
  };
}

function registryOf() {
  const registry = z.registry<{ id: string }>();
  registry.add(keySchema(REQUEST_LIMITS.claims), { id: "Key" });
  registry.add(ConventionsInput, { id: "Conventions" });
  registry.add(ClaimInput, { id: "Claim" });
  registry.add(CheckReport, { id: "CheckReport" });
  registry.add(PublicFinding, { id: "Finding" });
  registry.add(Slip, { id: "Slip" });
  registry.add(Counts, { id: "Summary" });
  registry.add(ProblemDocument, { id: "Problem" });
  return registry;
}

/** The parts of a JSON Schema document that have no place inside components. */
function withoutMeta(schemas: Record<string, Record<string, unknown>>) {
  return Object.fromEntries(
    Object.entries(schemas).map(([id, schema]) => {
      const { $schema: _schema, $id: _id, ...rest } = schema;
      return [id, rest];
    }),
  );
}
