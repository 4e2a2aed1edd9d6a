import type { RouteObject } from "react-router-dom";
import { NotFoundPage } from "./shell/NotFoundPage.tsx";
import { RouteError } from "./shell/RouteError.tsx";
import { Shell } from "./shell/Shell.tsx";

/** Every address of the product. A feature's code is fetched when one of its pages is first opened. */
export const routes: RouteObject[] = [
  {
    path: "/",
    element: <Shell />,
    errorElement: <RouteError />,
    children: [
      { path: "ask", lazy: async () => ({ Component: (await import("./features/questions/AskPage.tsx")).AskPage }) },
      { path: "*", element: <NotFoundPage /> },
    ],
  },
];
