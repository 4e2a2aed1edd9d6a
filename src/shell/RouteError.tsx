import { useRouteError } from "react-router-dom";
import { PageError } from "../components/PageError.tsx";

/** Stands in for a page that broke or couldn't be fetched. */
export function RouteError() {
  const error = useRouteError();
  return (
    <main>
      <PageError error={error instanceof Error ? error : new Error("Unknown")} onRetry={() => window.location.reload()} />
    </main>
  );
}
