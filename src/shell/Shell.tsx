import { Suspense, useEffect, useRef } from "react";
import { RouterProvider } from "react-aria-components";
import { Outlet, ScrollRestoration, useHref, useLocation, useNavigate } from "react-router-dom";
import { PageLoading } from "../components/PageLoading.tsx";
import { RequireSession } from "../lib/session.tsx";
import { Header } from "./Header.tsx";

/** Moves the focus to the content when the page changes, so that a screen reader starts there. */
function useFocusOnNewPage() {
  const main = useRef<HTMLElement>(null);
  const { pathname } = useLocation();
  const last = useRef(pathname);
  useEffect(() => {
    if (last.current === pathname) return;
    last.current = pathname;
    main.current?.focus({ preventScroll: true });
  }, [pathname]);
  return main;
}

/** Around every page of a signed-in person. */
export function Shell() {
  const navigate = useNavigate();
  const main = useFocusOnNewPage();
  return (
    <RouterProvider navigate={(to) => void navigate(to)} useHref={useHref}>
      <RequireSession>
        <a href="#content" className="absolute -top-20 left-4 z-30 bg-action px-4 py-2 text-on-action focus:top-2">
          Skip to the content
        </a>
        <div className="flex min-h-dvh flex-col">
          <Header />
          <main id="content" ref={main} tabIndex={-1} className="flex flex-1 flex-col outline-none">
            <Suspense fallback={<PageLoading what="the page" />}>
              <Outlet />
            </Suspense>
          </main>
        </div>
        <ScrollRestoration />
      </RequireSession>
    </RouterProvider>
  );
}
