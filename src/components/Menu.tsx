import { ChevronDown } from "lucide-react";
import type { ReactNode } from "react";
import { Button, Menu as AriaMenu, MenuItem, MenuTrigger, Popover } from "react-aria-components";
import { fieldStyle } from "./fieldStyle.ts";

export interface MenuEntry {
  id: string;
  label: string;
  /** A page of ours to go to… */
  to?: string;
  /** …or something to do. */
  onAction?: () => void;
  isDisabled?: boolean;
}

/** A button that opens a list of things to do or places to go. */
export function Menu({
  label,
  name,
  entries,
  className = "",
}: {
  label: ReactNode;
  name?: string;
  entries: readonly MenuEntry[];
  className?: string;
}) {
  return (
    <MenuTrigger>
      <Button
        aria-label={name}
        className={`inline-flex min-h-9 items-center gap-1.5 rounded-sm text-muted hover:text-action no-print ${className}`}
      >
        {label}
        <ChevronDown aria-hidden="true" className="size-4" />
      </Button>
      <Popover className={fieldStyle.popover} placement="bottom end">
        <AriaMenu className="min-w-48 py-1 outline-none" items={entries}>
          {(entry) => (
            <MenuItem
              id={entry.id}
              textValue={entry.label}
              href={entry.to}
              onAction={entry.onAction}
              isDisabled={entry.isDisabled ?? false}
              className={`block ${fieldStyle.option}`}
            >
              {entry.label}
            </MenuItem>
          )}
        </AriaMenu>
      </Popover>
    </MenuTrigger>
  );
}
