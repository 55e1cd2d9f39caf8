import { InvalidInput } from '../errors.js';
import type { Prisma } from './generated/client.js';

/** A JSON object as it stands in a row: storage keeps it and does not look inside. */
export type JsonRecord = Readonly<Record<string, unknown>>;

/**
 * The record in the form the database takes, once it is certain to come back the same.
 *
 * @throws {InvalidInput} when a number in it is not finite: JSON would keep it as null
 */
export function storedJson(record: JsonRecord): Prisma.InputJsonObject {
  const refuse = (path: string): never => {
    throw new InvalidInput(
      'A value that is not a number cannot be saved.',
      'Correct the figure, or mark it as not known.',
      [{ path, problem: 'is not a finite number' }],
    );
  };
  const walk = (value: unknown, path: string): void => {
    if (typeof value === 'number' && !Number.isFinite(value)) refuse(path);
    if (typeof value !== 'object' || value === null) return;
    for (const [key, inner] of Object.entries(value)) {
      walk(inner, `${path}/${key.replaceAll('~', '~0').replaceAll('/', '~1')}`);
    }
  };
  walk(record, '');
  return JSON.parse(JSON.stringify(record)) as Prisma.InputJsonObject;
}

/** The object in a Json column. */
export function jsonRecord(value: Prisma.JsonValue): JsonRecord {
  return typeof value === 'object' && value !== null && !Array.isArray(value) ? value : {};
}
