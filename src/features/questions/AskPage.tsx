import { Page } from "../../components/Page.tsx";

/** Where a question is put. */
export function AskPage() {
  return <Page title="Ask" lead="Of every 100 people in each group, how many are affected?" />;
}
