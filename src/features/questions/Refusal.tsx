import { Button } from "../../components/Button.tsx";
import { Notice } from "../../components/Notice.tsx";
import { messageOf } from "../../lib/form.ts";
import { ApiError } from "../../lib/request.ts";

/** Stands under the question line where there is no answer: the sentence stays, so that it can be changed. */
export function Refusal({ error, onRetry }: { error: Error; onRetry: () => unknown }) {
  return (
    <Notice kind="wrong" title={error instanceof ApiError ? error.problem.title : "This answer couldn't be worked out"}>
      <p>{messageOf(error)}</p>
      <p className="mt-3">
        <Button onPress={() => void onRetry()}>Try again</Button>
      </p>
    </Notice>
  );
}
