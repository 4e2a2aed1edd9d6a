import type { Request, RequestHandler } from "express";
import { AppError } from "../errors.ts";
import { Person } from "../models/Person.ts";
import type { Reader } from "../policies/policy.ts";
import { ABSOLUTE_LIMIT_MS } from "./session.ts";

const readers = new WeakMap<Request, Reader>();

/** Whose session this is, read from the database now; null for nobody, or for a person deactivated since. */
export async function findReader(request: Request): Promise<Reader | null> {
  const { personId, startedAt } = request.session;
  if (personId === undefined || startedAt === undefined || Date.now() - startedAt > ABSOLUTE_LIMIT_MS) return null;
  const person = await Person.findOne({ where: { id: personId, isActive: true }, include: "roleRows" });
  return person ? { id: person.id, name: person.name, email: person.email, roles: person.roles } : null;
}

/** Lets only signed-in, active people through; 401 otherwise. */
export const requirePerson: RequestHandler = async (request, _response, next) => {
  const reader = await findReader(request);
  if (!reader) throw new AppError("unauthenticated", "Sign in to go on. What you had is as it was.");
  readers.set(request, reader);
  next();
};

/** The person that `requirePerson` let through; null on a request that hasn't come so far. */
export const knownReader = (request: Request): Reader | null => readers.get(request) ?? null;

/** The person that `requirePerson` let through. */
export function currentReader(request: Request): Reader {
  const reader = knownReader(request);
  if (!reader) throw new Error("currentReader needs requirePerson before it.");
  return reader;
}
