import { Page, Section } from "../../components/Page.tsx";
import { CAUTIONS, GLOSSARY, METHODS } from "./texts.ts";

/** How figures come about, what words mean, and what always has to be kept in mind. */
export function HelpPage() {
  return (
    <Page
      title="Help"
      lead="How the figures come about, what the words mean, and what to keep in mind. No figure of any survey stands here."
    >
      <nav aria-label="On this page" className="mb-10 flex flex-wrap gap-x-6 gap-y-2 no-print">
        <a className="link" href="#cautions">
          Cautions
        </a>
        <a className="link" href="#methods">
          Methods
        </a>
        <a className="link" href="#glossary">
          Words
        </a>
      </nav>
      <div className="measure">
        <div id="cautions">
          <Section title="Cautions">
            <ul className="list-disc space-y-2 pl-5">
              {CAUTIONS.map((caution) => (
                <li key={caution}>{caution}</li>
              ))}
            </ul>
          </Section>
        </div>
        <div id="methods" className="mt-12">
          <Section title="Methods">
            <div className="space-y-6">
              {METHODS.map(({ title, text, source }) => (
                <div key={title}>
                  <h3 className="font-semibold">{title}</h3>
                  <p className="mt-1">{text}</p>
                  <p className="mt-1 text-sm text-muted">{source}</p>
                </div>
              ))}
            </div>
          </Section>
        </div>
        <div id="glossary" className="mt-12">
          <Section title="Words">
            <dl className="space-y-4">
              {GLOSSARY.map(({ word, meaning }) => (
                <div key={word}>
                  <dt className="font-semibold">{word}</dt>
                  <dd>{meaning}</dd>
                </div>
              ))}
            </dl>
          </Section>
        </div>
      </div>
    </Page>
  );
}
