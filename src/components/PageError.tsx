import { messageOf } from "../lib/form.ts";
import { ApiError } from "../lib/request.ts";
import { Button } from "./Button.tsx";
import { LinkButton } from "./LinkButton.tsx";

/** Stands where a page would be: what happened, and what to do next. A 404 or 403 can't be mended by another try. */
export function PageError({ error, onRetry }: { error: Error; onRetry?: () => unknown }) {
  const status = error instanceof ApiError ? error.problem.status : null;
  const isFinal = status === 403 || status === 404;
  return (
    <div role="alert" className="px-4 pt-10 pb-16 sm:px-8">
      <title>{status === 404 ? "Not found · Perhundred" : "Trouble · Perhundred"}</title>
      <h1 className="text-2xl font-light">{error instanceof ApiError ? error.problem.title : "This page broke"}</h1>
      <p className="measure mt-3">{messageOf(error)}</p>
      <div className="mt-6 flex flex-wrap gap-3">
        {!isFinal && onRetry && <Button onPress={() => void onRetry()}>Try again</Button>}
        <LinkButton to="/">Go to the start</LinkButton>
      </div>
    </div>
  );
}
