import { hash, verify } from "@node-rs/argon2";

/** OWASP's setting for Argon2id: 19 MiB, two passes. */
const OPTIONS = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

/** Long passwords that people choose often; the list is short because most common ones are under the minimum length. */
const COMMON = [
  "passwordpassword",
  "password12345678",
  "123456789012345",
  "1234567890123456",
  "qwertyuiopasdfgh",
  "qwertyuiop12345",
  "aaaaaaaaaaaaaaa",
  "letmeinletmeinletmein",
  "iloveyouiloveyou",
  "administrator123",
];

const normalise = (password: string) => password.normalize("NFKC");

/** Argon2id hash with its own salt and settings in it. */
export function hashPassword(password: string): Promise<string> {
  return hash(normalise(password), OPTIONS);
}

let decoy: Promise<string> | null = null;

/** Whether a password fits. Without a hash as much work is done, so that the time doesn't tell who has an account. */
export async function isRightPassword(passwordHash: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword("a password that nobody has");
  const isRight = await verify(passwordHash ?? (await decoy), normalise(password));
  return passwordHash !== null && isRight;
}

/** Why a password is too easily guessed; null where it isn't. */
export function weaknessOf(password: string, email: string): string | null {
  const plain = normalise(password).toLowerCase();
  const [mailbox = ""] = email.toLowerCase().split("@");
  if (COMMON.includes(plain) || new Set(plain).size < 4)
    return "Many people use this one. Choose a few words that belong together only for you.";
  if (plain.includes(email.toLowerCase()) || (mailbox.length >= 5 && plain.includes(mailbox)))
    return "Leave your e-mail address out of it.";
  if (plain.includes("perhundred")) return "Leave the product's name out of it.";
  return null;
}
