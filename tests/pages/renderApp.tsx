import { QueryClientProvider } from "@tanstack/react-query";
import { render } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { queryClient } from "../../src/lib/queryClient.ts";
import { routes } from "../../src/router.tsx";

/** The whole client at an address, as a person finds it. `address()` says where they are now. */
export function renderApp(at: string) {
  const router = createMemoryRouter(routes, { initialEntries: [at] });
  const user = userEvent.setup();
  const view = render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  const address = () => `${router.state.location.pathname}${router.state.location.search}`;
  return { ...view, user, router, address };
}
