import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';
import { canonicalize } from 'json-canonicalize';

/** SHA-256, in hexadecimal, over the RFC 8785 canonical JSON of a value. */
export function canonicalHash(value: unknown): string {
  return bytesToHex(sha256(utf8ToBytes(canonicalize(value))));
}

const significantDigits = 9;

/** A result with every number at nine significant digits: how results are stored and compared. */
export function atNineDigits<T>(value: T): T {
  if (typeof value === 'number') return Number(value.toPrecision(significantDigits)) as T;
  if (Array.isArray(value)) return value.map((item: unknown) => atNineDigits(item)) as T;
  if (value === null || typeof value !== 'object') return value;
  return Object.fromEntries(
    Object.entries(value).map(([key, item]: [string, unknown]) => [key, atNineDigits(item)]),
  ) as T;
}
