import { z } from "zod";
import { requireScenarioThing } from "@/db/queries/scenario-access";
import { requireScenario } from "@/db/queries/scenarios";
import {
  changeArchived,
  changeTags,
  changeTitle,
  createScenario as insertScenario,
} from "@/db/queries/scenario-changes";
import { failure, success } from "@/lib/result";
import { templateById } from "@/lib/scenario/templates";
import { defineDeed } from "../deed";
import { keyField, scenarioField, titleField } from "../findings";
import { summarise } from "../summary";

const oneScenario = z.object({ scenarioId: keyField });
const TAG_RULE = "A tag has 1 to 32 characters; a scenario has at most 12.";
const tagsField = z
  .array(z.string().trim().min(1, { error: TAG_RULE }).max(32, { error: TAG_RULE }))
  .transform((tags) => [...new Set(tags)])
  .refine((tags) => tags.length <= 12, { error: TAG_RULE });

const newScenarioInput = z
  .object({
    templateId: z.string().max(80).optional(),
    document: scenarioField.optional(),
    title: titleField.optional(),
  })
  .transform((input, context) => {
    const template = input.templateId === undefined ? undefined : templateById(input.templateId);
    const document = input.document ?? template?.document;
    if (!document) {
      context.addIssue({ code: "custom", path: ["templateId"], message: "Choose a template or give a document." });
      return z.NEVER;
    }
    const title = input.title ?? document.title;
    const isFromTemplate = template !== undefined && input.document === undefined;
    return {
      title,
      document: { ...document, title },
      tags: isFromTemplate ? [...template.tags] : [],
      message: isFromTemplate ? `From the template "${template.title}"` : "Imported",
    };
  });

/** A new scenario from a template or a document. */
export const createScenario = defineDeed({
  deed: "scenario.create",
  input: newScenarioInput,
  limit: "revision.save",
  prepare: ({ input }) => summarise(input.document),
  run: async ({ tx, scope, input, prepared }) =>
    success({ id: await insertScenario(tx, scope, { ...input, summary: prepared }) }),
  audit: ({ input, result }) => ({ thingId: result.ok ? result.value.id : undefined, detail: { title: input.title } }),
});

/** A copy of the revision that the person sees, owned by them. */
export const duplicateScenario = defineDeed({
  deed: "scenario.duplicate",
  input: oneScenario.extend({ title: titleField.optional() }),
  thing: (tx, scope, input) => requireScenarioThing(tx, scope, input.scenarioId),
  run: async ({ tx, scope, input }) => {
    const source = await requireScenario(tx, scope, input.scenarioId);
    const title = input.title ?? `Copy of ${source.title}`.slice(0, 120);
    const id = await insertScenario(tx, scope, {
      title,
      tags: source.tags,
      document: { ...source.revision.document, title },
      message: `Copy of "${source.title}", revision ${source.revision.number}`,
      summary: source.summary,
      copiedFromId: source.id,
    });
    return success({ id });
  },
  audit: ({ input, result }) => ({
    thingId: result.ok ? result.value.id : undefined,
    detail: { from: input.scenarioId },
  }),
});

/** The document of the revision that the person sees. */
export const readDocument = defineDeed({
  deed: "scenario.read",
  input: oneScenario,
  thing: (tx, scope, input) => requireScenarioThing(tx, scope, input.scenarioId),
  run: async ({ tx, scope, input }) => success((await requireScenario(tx, scope, input.scenarioId)).revision.document),
});

export const renameScenario = defineDeed({
  deed: "scenario.rename",
  input: oneScenario.extend({ title: titleField }),
  thing: (tx, scope, input) => requireScenarioThing(tx, scope, input.scenarioId),
  run: async ({ tx, scope, input, thing }) => {
    if (thing.isArchived) return failure("edit.archived");
    await changeTitle(tx, scope, input.scenarioId, input.title);
    return success({ title: input.title });
  },
  audit: ({ input }) => ({ thingId: input.scenarioId, detail: { title: input.title } }),
});

export const setTags = defineDeed({
  deed: "scenario.tag",
  input: oneScenario.extend({ tags: tagsField }),
  thing: (tx, scope, input) => requireScenarioThing(tx, scope, input.scenarioId),
  run: async ({ tx, scope, input, thing }) => {
    if (thing.isArchived) return failure("edit.archived");
    await changeTags(tx, scope, input.scenarioId, input.tags);
    return success({ tags: input.tags });
  },
  audit: ({ input }) => ({ thingId: input.scenarioId, detail: { tags: input.tags } }),
});

export const archiveScenario = defineDeed({
  deed: "scenario.archive",
  input: oneScenario,
  thing: (tx, scope, input) => requireScenarioThing(tx, scope, input.scenarioId),
  run: async ({ tx, scope, input }) => {
    await changeArchived(tx, scope, input.scenarioId, true);
    return success(null);
  },
  audit: ({ input }) => ({ thingId: input.scenarioId }),
});

export const restoreScenario = defineDeed({
  deed: "scenario.restore",
  input: oneScenario,
  thing: (tx, scope, input) => requireScenarioThing(tx, scope, input.scenarioId),
  run: async ({ tx, scope, input }) => {
    await changeArchived(tx, scope, input.scenarioId, false);
    return success(null);
  },
  audit: ({ input }) => ({ thingId: input.scenarioId }),
});
