import { useInfiniteQuery, useQuery } from "@tanstack/react-query";
import { useSearchParams } from "react-router-dom";
import { LedgerAction, type LedgerEntryView } from "../../../shared/contracts/ledger.ts";
import { formatDateTime } from "../../../shared/format.ts";
import { Button } from "../../components/Button.tsx";
import { Chooser } from "../../components/Chooser.tsx";
import { EmptyState } from "../../components/EmptyState.tsx";
import { DownloadLink } from "../../components/LinkButton.tsx";
import { Notice } from "../../components/Notice.tsx";
import { Page } from "../../components/Page.tsx";
import { PageError } from "../../components/PageError.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { TextField } from "../../components/TextField.tsx";
import { messageOf } from "../../lib/form.ts";
import { useSession } from "../../lib/session.tsx";
import { surveysQuery } from "../../lib/surveys.ts";
import { ACTION_WORDS } from "./actionWords.ts";
import { ledgerQuery, ledgerSearch, type LedgerFilter } from "./queries.ts";

function scopeWords(roles: readonly string[]): string {
  if (roles.includes("administrator")) return "Everything that was done in this installation.";
  if (roles.includes("steward")) return "What was done with the surveys you look after, and what you did yourself.";
  return "What you did yourself. Stewards see what concerns their surveys.";
}

/** What was done, by whom and when; the filter stands in the address. */
export function LedgerPage() {
  const { person } = useSession();
  const [search, setSearch] = useSearchParams();
  const action = LedgerAction.safeParse(search.get("action"));
  const filter: LedgerFilter = {
    survey: search.get("survey"),
    action: action.success ? action.data : null,
    text: search.get("text") ?? "",
  };
  const ledger = useInfiniteQuery({ ...ledgerQuery(filter), placeholderData: (last) => last });
  const surveys = useQuery(surveysQuery);
  const change = (name: "survey" | "action" | "text", value: string | null) => {
    setSearch(
      (present) => {
        const next = new URLSearchParams(present);
        if (value === null || value === "") next.delete(name);
        else next.set(name, value);
        return next;
      },
      { replace: true },
    );
  };
  if (ledger.isPending) return <PageLoading what="the ledger" />;
  if (ledger.isError && !ledger.data) return <PageError error={ledger.error} onRetry={ledger.refetch} />;
  const entries = ledger.data.pages.flatMap((page) => page.entries);
  return (
    <Page
      title="Ledger"
      lead={scopeWords(person.roles)}
      actions={<DownloadLink href={`/api/ledger.csv${ledgerSearch(filter)}`}>Download as CSV</DownloadLink>}
    >
      <form
        role="search"
        aria-label="Ledger"
        className="mb-8 grid gap-4 sm:grid-cols-3"
        onSubmit={(event) => event.preventDefault()}
      >
        <TextField label="Person or words" type="search" value={filter.text} onChange={(text) => change("text", text)} />
        <Chooser
          label="Act"
          placeholder="Any"
          choices={LedgerAction.options.map((id) => ({ id, label: ACTION_WORDS[id] }))}
          value={filter.action}
          onChange={(id) => change("action", id)}
        />
        <Chooser
          label="Survey"
          placeholder="Any"
          choices={(surveys.data?.surveys ?? []).map(({ id, title }) => ({ id, label: title }))}
          value={filter.survey}
          onChange={(id) => change("survey", id)}
        />
      </form>
      {entries.length === 0 ? (
        <EmptyState title="Nothing fits">
          <p>No act fits this filter. Clear a field to see more.</p>
        </EmptyState>
      ) : (
        <Entries entries={entries} />
      )}
      {ledger.isFetchNextPageError && <Notice kind="wrong">{messageOf(ledger.error)}</Notice>}
      {ledger.hasNextPage && (
        <div className="mt-6">
          <Button onPress={() => void ledger.fetchNextPage()} isPending={ledger.isFetchingNextPage}>
            Show earlier acts
          </Button>
        </div>
      )}
    </Page>
  );
}

function Entries({ entries }: { entries: readonly LedgerEntryView[] }) {
  return (
    <ol aria-label="Acts, newest first" className="border-t border-line">
      {entries.map((entry) => (
        <li key={entry.id} className="grid gap-x-6 border-b border-line py-2.5 sm:grid-cols-[13rem_1fr]">
          <p className="text-sm text-muted">
            <time dateTime={entry.at}>{formatDateTime(entry.at)}</time>
            <span className="block">{entry.actor ?? "The system"}</span>
          </p>
          <p className="text-[0.9375rem] break-words">
            {entry.summary}
            <span className="block text-sm text-muted">
              {ACTION_WORDS[entry.action]}
              {entry.surveyTitle && ` · ${entry.surveyTitle}`}
            </span>
          </p>
        </li>
      ))}
    </ol>
  );
}
