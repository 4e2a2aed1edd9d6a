import { useState } from "react";
import type { z } from "zod";
import type { NewSignInLink } from "../../../shared/contracts/people.ts";
import { formatDateTime } from "../../../shared/format.ts";
import { Button } from "../../components/Button.tsx";
import { Notice } from "../../components/Notice.tsx";

/** A one-time link, in view until it was handed over: it can't be shown again. */
export function NewLink({ made, onDone }: { made: z.infer<typeof NewSignInLink>; onDone: () => void }) {
  const [isCopied, setIsCopied] = useState(false);
  const copy = async () => {
    await navigator.clipboard.writeText(made.link);
    setIsCopied(true);
  };
  return (
    <div className="mb-8">
      <Notice kind="done" title={`Sign-in link for ${made.person.name}`}>
        <p>
          Hand it over in person or by a channel you trust. It works once, until {formatDateTime(made.expiresAt)}, and is shown
          only now.
        </p>
        <code className="mt-3 block bg-paper px-3 py-2 text-sm break-all select-all">{made.link}</code>
        <div className="mt-3 flex flex-wrap gap-3">
          <Button onPress={() => void copy()}>{isCopied ? "Copied" : "Copy the link"}</Button>
          <Button kind="plain" onPress={onDone}>
            Done, hide it
          </Button>
        </div>
      </Notice>
    </div>
  );
}
