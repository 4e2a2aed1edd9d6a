import { createHash, randomBytes } from "node:crypto";
import { Op, type Transaction } from "sequelize";
import { AppError } from "../errors.ts";
import { SignInLink } from "../models/Person.ts";

const LIFETIME_MS = 72 * 60 * 60 * 1000;

const hashToken = (token: string) => createHash("sha256").update(token).digest("hex");

/** Makes a person's one-time link, replacing the one before. Only its hash is kept: the token can't be had again. */
export async function makeSignInLink(
  personId: string,
  publicUrl: string,
  transaction: Transaction,
): Promise<{ link: string; expiresAt: Date }> {
  const token = randomBytes(32).toString("base64url");
  const expiresAt = new Date(Date.now() + LIFETIME_MS);
  await SignInLink.destroy({ where: { personId }, transaction });
  await SignInLink.create({ tokenHash: hashToken(token), personId, expiresAt, createdAt: new Date() }, { transaction });
  return { link: `${publicUrl}/welcome/${token}`, expiresAt };
}

/** A link that still holds. @throws {AppError} `notFound` for one used, expired, replaced or never made. */
export async function findSignInLink(token: string, transaction?: Transaction): Promise<SignInLink> {
  const link = await SignInLink.findOne({
    where: { tokenHash: hashToken(token), expiresAt: { [Op.gt]: new Date() } },
    ...(transaction ? { transaction, lock: transaction.LOCK.UPDATE } : {}),
  });
  if (!link)
    throw new AppError(
      "notFound",
      "This link was used, has run out or was replaced by a newer one. Ask your administrator for a new one.",
    );
  return link;
}
