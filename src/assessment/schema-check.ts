import { Ajv2020, type ErrorObject, type ValidateFunction } from 'ajv/dist/2020.js';
import * as formats from 'ajv-formats';
import type { Static, TSchema } from 'typebox';
import { InvalidInput, type ErrorDetail } from '../errors.js';

const ajv = new Ajv2020({ allErrors: true, strict: false, allowUnionTypes: true });
formats.default.default(ajv);

const compiled = new WeakMap<TSchema, ValidateFunction>();

function validatorOf(schema: TSchema): ValidateFunction {
  const known = compiled.get(schema);
  if (known) return known;
  const fresh = ajv.compile(schema);
  compiled.set(schema, fresh);
  return fresh;
}

function problemOf(error: ErrorObject): ErrorDetail {
  const params = error.params as Record<string, unknown>;
  switch (error.keyword) {
    case 'required':
      return {
        path: `${error.instancePath}/${String(params.missingProperty)}`,
        problem: 'is missing',
      };
    case 'additionalProperties':
      return {
        path: `${error.instancePath}/${String(params.additionalProperty)}`,
        problem: 'is not a known field',
      };
    case 'enum':
      return {
        path: error.instancePath,
        problem: `must be one of ${(params.allowedValues as unknown[]).map(String).join(', ')}`,
      };
    case 'const':
      return { path: error.instancePath, problem: `must be ${String(params.allowedValue)}` };
    default:
      return { path: error.instancePath, problem: error.message ?? 'does not fit' };
  }
}

/** Places where a value does not fit its schema, each once; empty when it fits. */
export function schemaProblems(schema: TSchema, value: unknown): readonly ErrorDetail[] {
  const validate = validatorOf(schema);
  if (validate(value)) return [];
  // Branches of a union each complain; the deepest complaint is the one a person can act on.
  const problems = (validate.errors ?? [])
    .filter((error) => error.keyword !== 'anyOf' && error.keyword !== 'oneOf')
    .map(problemOf);
  const seen = new Set<string>();
  return problems.filter(({ path, problem }) => {
    const key = `${path} ${problem}`;
    if (seen.has(key)) return false;
    seen.add(key);
    return true;
  });
}

/**
 * The value, typed, once it fits the schema.
 *
 * @throws {InvalidInput} naming every place that does not fit
 */
export function fitting<S extends TSchema>(schema: S, value: unknown, what: string): Static<S> {
  const problems = schemaProblems(schema, value);
  if (problems.length > 0) {
    const [first] = problems;
    const where = first && first.path !== '' ? ` at ${first.path}` : '';
    throw new InvalidInput(
      `The ${what} does not fit its schema${where}: ${first?.problem ?? 'unknown problem'}.`,
      'Correct the places listed under details; the schema command prints what is expected.',
      problems,
    );
  }
  return value as Static<S>;
}
