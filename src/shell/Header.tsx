import { MenuIcon, UserRound } from "lucide-react";
import { Link, NavLink } from "react-router-dom";
import { Menu } from "../components/Menu.tsx";
import { useSignOut } from "../lib/signOut.ts";
import { useSession } from "../lib/session.tsx";
import { Mark } from "./Mark.tsx";
import { placesFor } from "./navigation.ts";

/** Mark, main places and the person's own menu. On a narrow screen the places are a menu too. */
export function Header() {
  const { person, permissions } = useSession();
  const places = placesFor(permissions);
  const signOut = useSignOut();
  return (
    <header className="flex min-h-14 items-center gap-6 border-b border-line px-4 sm:px-8 no-print">
      <Link to="/" className="flex min-h-9 items-center gap-2.5 font-semibold" aria-label="Perhundred, start page">
        <Mark />
        Perhundred
      </Link>
      <nav aria-label="Main" className="hidden self-stretch sm:flex sm:gap-5">
        {places.map((place) => (
          <NavLink
            key={place.to}
            to={place.to}
            className="inline-flex items-center border-b-2 border-transparent pt-0.5 text-[0.9375rem] text-muted hover:text-action aria-[current=page]:border-action aria-[current=page]:font-semibold aria-[current=page]:text-action"
          >
            {place.label}
          </NavLink>
        ))}
      </nav>
      <div className="ml-auto flex items-center gap-4 text-[0.9375rem]">
        <Menu
          name={`Your menu, ${person.name}`}
          label={
            <>
              <UserRound aria-hidden="true" className="size-5 sm:hidden" />
              <span className="hidden max-w-48 truncate sm:inline">{person.name}</span>
            </>
          }
          entries={[
            { id: "account", label: "Account", to: "/account" },
            { id: "signOut", label: "Sign out", onAction: () => signOut.mutate() },
          ]}
        />
        <Menu
          className="sm:hidden"
          name="Main menu"
          label={<MenuIcon aria-hidden="true" className="size-5" />}
          entries={places.map((place) => ({ id: place.to, ...place }))}
        />
      </div>
    </header>
  );
}
