import { useQuery } from "@tanstack/react-query";
import { useVirtualizer } from "@tanstack/react-virtual";
import { useRef, useState } from "react";
import { useSearchParams } from "react-router-dom";
import type { CodebookView, VariableView } from "../../../shared/contracts/codebook.ts";
import { formatCounted } from "../../../shared/format.ts";
import { Button } from "../../components/Button.tsx";
import { DownloadLink } from "../../components/LinkButton.tsx";
import { PageError } from "../../components/PageError.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { TextField } from "../../components/TextField.tsx";
import { codebookQuery } from "./queries.ts";
import { useRelease } from "./ReleaseLayout.tsx";
import { VariableDialog } from "./VariableDialog.tsx";
import { variableWords } from "./variableWords.ts";

const ROW_HEIGHT = 76;

const holds = ({ name, label, categories }: VariableView, typed: string) => {
  const text = [name, label, ...categories.map((category) => category.label)].join(" ").toLocaleLowerCase();
  return typed
    .toLocaleLowerCase()
    .split(/\s+/)
    .every((word) => text.includes(word));
};

/** The release's variables, found by any word of name, label or category. */
export function CodebookTab() {
  const release = useRelease();
  const codebook = useQuery(codebookQuery(release.id));
  if (codebook.isPending) return <PageLoading what="the codebook" />;
  if (codebook.isError) return <PageError error={codebook.error} onRetry={codebook.refetch} />;
  return <Codebook codebook={codebook.data} />;
}

function Codebook({ codebook }: { codebook: CodebookView }) {
  const [search, setSearch] = useSearchParams();
  const typed = search.get("find") ?? "";
  const [openId, setOpenId] = useState<string | null>(null);
  const found = codebook.variables.filter((variable) => holds(variable, typed));
  const open = codebook.variables.find(({ id }) => id === openId);
  return (
    <>
      <div className="mb-4 flex flex-wrap items-end justify-between gap-4">
        <div className="w-full max-w-md">
          <TextField
            label="Find a variable"
            type="search"
            placeholder="Name, label or category"
            value={typed}
            onChange={(text) => setSearch(text === "" ? {} : { find: text }, { replace: true })}
          />
        </div>
        <DownloadLink href={`/api/releases/${codebook.releaseId}/codebook.csv`}>Download as CSV</DownloadLink>
      </div>
      <p role="status" className="mb-2 text-sm text-muted">
        {typed === ""
          ? formatCounted(found.length, "variable")
          : `${formatCounted(found.length, "variable")} of ${codebook.variables.length}`}
      </p>
      {found.length === 0 ? (
        <p className="text-muted">No variable by these words. Try fewer, or part of a word.</p>
      ) : (
        <Variables variables={found} codebook={codebook} onOpen={setOpenId} />
      )}
      {open && <VariableDialog key={open.id} variable={open} codebook={codebook} onClose={() => setOpenId(null)} />}
    </>
  );
}

function Variables({
  variables,
  codebook,
  onOpen,
}: {
  variables: VariableView[];
  codebook: CodebookView;
  onOpen: (id: string) => void;
}) {
  const scroller = useRef<HTMLDivElement>(null);
  const rows = useVirtualizer({
    count: variables.length,
    getScrollElement: () => scroller.current,
    estimateSize: () => ROW_HEIGHT,
    overscan: 8,
  });
  return (
    <div
      ref={scroller}
      tabIndex={0}
      role="region"
      aria-label="Variables"
      className="max-h-[70vh] overflow-y-auto border-y border-line"
    >
      <ul className="relative" style={{ height: rows.getTotalSize() }}>
        {rows.getVirtualItems().map((item) => {
          const variable = variables[item.index];
          if (!variable) return null;
          const isOfDesign = codebook.designVariables.includes(variable.name);
          return (
            <li
              key={variable.id}
              ref={rows.measureElement}
              data-index={item.index}
              className="absolute inset-x-0 flex items-start justify-between gap-4 border-b border-line py-2.5"
              style={{ top: item.start }}
            >
              <div className="min-w-0">
                <p className="font-medium break-words">
                  {variable.label || variable.name}{" "}
                  <span className="font-normal text-muted">{variable.label && variable.name}</span>
                </p>
                <p className="text-sm text-muted">
                  {variableWords(variable)}
                  {isOfDesign && " · part of the design"}
                </p>
              </div>
              <Button
                kind="plain"
                aria-label={`${codebook.can.update ? "Change" : "Look at"} ${variable.name}`}
                onPress={() => onOpen(variable.id)}
              >
                {codebook.can.update ? "Change" : "Look"}
              </Button>
            </li>
          );
        })}
      </ul>
    </div>
  );
}
