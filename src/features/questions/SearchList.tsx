import { Search } from "lucide-react";
import { Autocomplete, Input, ListBox, ListBoxItem, SearchField, Text } from "react-aria-components";
import type { Choice } from "../../components/Chooser.tsx";
import { fieldStyle } from "../../components/fieldStyle.ts";

const holds = (text: string, typed: string) => {
  const words = typed.toLocaleLowerCase().split(/\s+/u).filter(Boolean);
  return words.every((word) => text.toLocaleLowerCase().includes(word));
};

export interface SearchListProps {
  /** What the list holds, for its name and its search field. */
  label: string;
  choices: readonly Choice[];
  chosen?: string | null;
  onChoose: (id: string) => void;
  disabled?: readonly string[];
}

/** A list that is narrowed by typing any words of a label or detail; arrows and Enter choose while typing. */
export function SearchList({ label, choices, chosen = null, onChoose, disabled = [] }: SearchListProps) {
  return (
    <Autocomplete filter={holds}>
      <SearchField aria-label={label} autoFocus className="sticky top-0 z-1 bg-raised px-4 pt-1 pb-2">
        <Search aria-hidden="true" className="pointer-events-none absolute top-4 left-7 size-4 text-muted" />
        <Input placeholder="Type to search" className={`${fieldStyle.input} pl-9 [&::-webkit-search-cancel-button]:hidden`} />
      </SearchField>
      <ListBox<Choice>
        aria-label={label}
        items={choices}
        selectionMode="single"
        selectedKeys={chosen === null ? [] : [chosen]}
        disabledKeys={disabled}
        onSelectionChange={(keys) => {
          // Choosing what is chosen already empties the set; it stays chosen.
          const [key = chosen] = keys === "all" ? [] : keys;
          if (key !== null) onChoose(String(key));
        }}
        className="border-t border-line py-1 outline-none"
        renderEmptyState={() => <p className="px-4 py-3 text-sm text-muted">Nothing by that name.</p>}
      >
        {(choice) => (
          <ListBoxItem
            id={choice.id}
            textValue={`${choice.label} ${choice.detail ?? ""}`}
            className={`${fieldStyle.option} px-4`}
          >
            <Text slot="label">{choice.label}</Text>
            {choice.detail !== undefined && (
              <Text slot="description" className="block text-sm font-normal text-muted">
                {choice.detail}
              </Text>
            )}
          </ListBoxItem>
        )}
      </ListBox>
    </Autocomplete>
  );
}
