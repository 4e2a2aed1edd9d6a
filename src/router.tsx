import type { RouteObject } from "react-router-dom";
import { PageLoading } from "./components/PageLoading.tsx";
import { NotFoundPage } from "./shell/NotFoundPage.tsx";
import { RouteError } from "./shell/RouteError.tsx";
import { Shell } from "./shell/Shell.tsx";

/** Every address of the product. A feature's code is fetched when one of its pages is first opened. */
export const routes: RouteObject[] = [
  {
    path: "/sign-in",
    errorElement: <RouteError />,
    hydrateFallbackElement: <PageLoading what="the page" />,
    lazy: async () => ({ Component: (await import("./features/session/SignInPage.tsx")).SignInPage }),
  },
  {
    path: "/welcome/:token",
    errorElement: <RouteError />,
    hydrateFallbackElement: <PageLoading what="the page" />,
    lazy: async () => ({ Component: (await import("./features/session/WelcomePage.tsx")).WelcomePage }),
  },
  {
    path: "/",
    element: <Shell />,
    errorElement: <RouteError />,
    hydrateFallbackElement: <PageLoading what="the page" />,
    children: [
      { index: true, lazy: async () => ({ Component: (await import("./features/home/HomePage.tsx")).HomePage }) },
      {
        path: "holdings",
        lazy: async () => ({ Component: (await import("./features/holdings/HoldingsPage.tsx")).HoldingsPage }),
      },
      {
        path: "surveys/:surveyId",
        lazy: async () => ({ Component: (await import("./features/holdings/SurveyPage.tsx")).SurveyPage }),
      },
      {
        path: "surveys/:surveyId/access",
        lazy: async () => ({ Component: (await import("./features/access/AccessPage.tsx")).AccessPage }),
      },
      {
        path: "releases/:releaseId",
        lazy: async () => ({ Component: (await import("./features/releases/ReleaseLayout.tsx")).ReleaseLayout }),
        children: [
          { index: true, lazy: async () => ({ Component: (await import("./features/releases/OverviewTab.tsx")).OverviewTab }) },
          {
            path: "codebook",
            lazy: async () => ({ Component: (await import("./features/releases/CodebookTab.tsx")).CodebookTab }),
          },
          { path: "design", lazy: async () => ({ Component: (await import("./features/releases/DesignTab.tsx")).DesignTab }) },
          {
            path: "readiness",
            lazy: async () => ({ Component: (await import("./features/releases/ReadinessTab.tsx")).ReadinessTab }),
          },
        ],
      },
      { path: "ask", lazy: async () => ({ Component: (await import("./features/questions/AskPage.tsx")).AskPage }) },
      { path: "ledger", lazy: async () => ({ Component: (await import("./features/ledger/LedgerPage.tsx")).LedgerPage }) },
      { path: "people", lazy: async () => ({ Component: (await import("./features/people/PeoplePage.tsx")).PeoplePage }) },
      { path: "account", lazy: async () => ({ Component: (await import("./features/account/AccountPage.tsx")).AccountPage }) },
      { path: "help", lazy: async () => ({ Component: (await import("./features/help/HelpPage.tsx")).HelpPage }) },
      { path: "*", element: <NotFoundPage /> },
    ],
  },
];
