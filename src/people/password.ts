import { hash, verify } from '@node-rs/argon2';

// Argon2id (the package's default) with the first of the two parameter sets that RFC 9106, section 4,
// leaves to memory-constrained machines: 64 MiB, 3 passes, 4 lanes.
const parameters = { memoryCost: 65_536, timeCost: 3, parallelism: 4 };

export const passwordHash = (password: string): Promise<string> => hash(password, parameters);

// Checked against when there is no such account, so that the time taken does not tell.
let nobody: Promise<string> | undefined;

/** Whether the password belongs to the hash; without a hash, no, after the same time. */
export async function isPasswordOf(stored: string | undefined, password: string): Promise<boolean> {
  nobody ??= passwordHash('nobody');
  const matches = await verify(stored ?? (await nobody), password);
  return matches && stored !== undefined;
}
