type Schema = Record<string, unknown>;
type Fault = { path: string; why: string };

const typeOf = (value: unknown): string => (value === null ? "null" : Array.isArray(value) ? "array" : typeof value);

/**
 * A plain check of a value against the keywords of JSON Schema 2020-12 that the published schemas use. A keyword it does
 * not know is a fault of its own, so that nothing goes unchecked in silence.
 */
export function findSchemaFaults(schema: Schema, value: unknown, path = "$"): Fault[] {
  const faults: Fault[] = [];
  const fail = (why: string) => void faults.push({ path, why });
  for (const [keyword, rule] of Object.entries(schema)) {
    const check = CHECKS[keyword];
    if (check) faults.push(...check(rule, value, path, schema));
    else if (!ANNOTATIONS.has(keyword)) fail(`keyword ${keyword} is not known here`);
  }
  return faults;
}

const ANNOTATIONS = new Set(["$schema", "$id", "title", "description", "default", "format", "required"]);
type Check = (rule: unknown, value: unknown, path: string, schema: Schema) => Fault[];
const unless = (isFine: boolean, path: string, why: string): Fault[] => (isFine ? [] : [{ path, why }]);
const isNumber = (value: unknown): value is number => typeof value === "number";
const isObject = (value: unknown): value is Record<string, unknown> => typeOf(value) === "object";

const CHECKS: Record<string, Check> = {
  type: (rule, value, path) => {
    const actual = typeOf(value);
    const isFine = [rule].flat().some((type) => type === actual || (type === "integer" && Number.isInteger(value)));
    return unless(isFine, path, `is ${actual}, not ${String(rule)}`);
  },
  const: (rule, value, path) => unless(value === rule, path, `is not ${String(rule)}`),
  enum: (rule, value, path) => unless((rule as unknown[]).includes(value), path, "is none of the allowed words"),
  minimum: (rule, value, path) =>
    unless(!isNumber(value) || value >= (rule as number), path, `is below ${String(rule)}`),
  maximum: (rule, value, path) =>
    unless(!isNumber(value) || value <= (rule as number), path, `is above ${String(rule)}`),
  exclusiveMinimum: (rule, value, path) =>
    unless(!isNumber(value) || value > (rule as number), path, `is not above ${String(rule)}`),
  exclusiveMaximum: (rule, value, path) =>
    unless(!isNumber(value) || value < (rule as number), path, `is not below ${String(rule)}`),
  minLength: (rule, value, path) =>
    unless(typeof value !== "string" || value.length >= (rule as number), path, "is too short"),
  maxLength: (rule, value, path) =>
    unless(typeof value !== "string" || value.length <= (rule as number), path, "is too long"),
  minItems: (rule, value, path) =>
    unless(!Array.isArray(value) || value.length >= (rule as number), path, "has too few"),
  maxItems: (rule, value, path) =>
    unless(!Array.isArray(value) || value.length <= (rule as number), path, "has too many"),
  items: (rule, value, path) =>
    Array.isArray(value)
      ? value.flatMap((item, index) => findSchemaFaults(rule as Schema, item, `${path}.${index}`))
      : [],
  properties: (rule, value, path, schema) => {
    if (!isObject(value)) return [];
    const rules = rule as Record<string, Schema>;
    const missing = ((schema.required as string[] | undefined) ?? []).filter((name) => !(name in value));
    const known = Object.entries(rules).flatMap(([name, one]) =>
      name in value ? findSchemaFaults(one, value[name], `${path}.${name}`) : [],
    );
    return [...missing.map((name) => ({ path: `${path}.${name}`, why: "is missing" })), ...known];
  },
  additionalProperties: (rule, value, path, schema) => {
    if (!isObject(value)) return [];
    const extra = Object.keys(value).filter((name) => !(name in ((schema.properties as Schema | undefined) ?? {})));
    if (rule === false) return extra.map((name) => ({ path: `${path}.${name}`, why: "is not known" }));
    return extra.flatMap((name) => findSchemaFaults(rule as Schema, value[name], `${path}.${name}`));
  },
  anyOf: (rule, value, path) =>
    unless(
      (rule as Schema[]).some((one) => findSchemaFaults(one, value).length === 0),
      path,
      "fits no alternative",
    ),
  oneOf: (rule, value, path) =>
    unless(
      (rule as Schema[]).filter((one) => findSchemaFaults(one, value).length === 0).length === 1,
      path,
      "fits not exactly one alternative",
    ),
  allOf: (rule, value, path) => (rule as Schema[]).flatMap((one) => findSchemaFaults(one, value, path)),
};
