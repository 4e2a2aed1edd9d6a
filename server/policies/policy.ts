import type { Role } from "../../shared/roles.ts";

/** Who asks, as policies see them: loaded fields only. */
export interface Reader {
  id: string;
  name: string;
  email: string;
  roles: readonly Role[];
}

/** Named rules over one kind of thing. `read` decides between 404 and 403. */
export type Policy<Thing> = Record<string, (reader: Reader, thing: Thing) => boolean> & {
  read: (reader: Reader, thing: Thing) => boolean;
};
