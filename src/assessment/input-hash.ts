import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';
import { canonicalize } from 'json-canonicalize';

/** SHA-256, in hexadecimal, over the RFC 8785 canonical JSON of a value. */
export function canonicalHash(value: unknown): string {
  return bytesToHex(sha256(utf8ToBytes(canonicalize(value))));
}

/** A number at nine significant digits: how results are stored and compared. */
export function atNineDigits(value: number): number {
  return Number.isFinite(value) ? Number(value.toPrecision(9)) : value;
}
