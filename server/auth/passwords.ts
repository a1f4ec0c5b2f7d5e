import { hash, verify } from "@node-rs/argon2";

/** argon2id with 19 MiB and two passes, the least that is commonly advised; 60-100 ms a hash. */
const COST = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

export function hashPassword(password: string): Promise<string> {
  return hash(password, COST);
}

let decoy: Promise<string> | undefined;

/**
 * Whether a password is the one that was hashed. Without a hash the answer is no, after as long a time: how long a
 * sign-in takes must not tell which addresses have an account.
 */
export async function isPassword(password: string, stored: string | undefined): Promise<boolean> {
  decoy ??= hashPassword(crypto.randomUUID());
  const matches = await verify(stored ?? (await decoy), password);
  return matches && stored !== undefined;
}
