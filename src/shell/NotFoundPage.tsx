import { LinkButton } from "../components/LinkButton.tsx";
import { Page } from "../components/Page.tsx";

/** For addresses that lead nowhere. */
export function NotFoundPage() {
  return (
    <Page
      title="There is no page here"
      lead="The address may be mistyped, or what it named was taken away or isn't open to you. Nothing was changed."
    >
      <div className="flex flex-wrap gap-3">
        <LinkButton to="/">Go to the start</LinkButton>
        <LinkButton to="/holdings" kind="plain">
          See the holdings
        </LinkButton>
      </div>
    </Page>
  );
}
