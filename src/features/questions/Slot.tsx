import { ChevronDown, X } from "lucide-react";
import type { ReactNode } from "react";
import { Button, Dialog, DialogTrigger, Heading, Popover, Pressable } from "react-aria-components";

const LOOK = {
  line:
    "cursor-pointer rounded-t-sm border-b-2 box-decoration-clone px-0.5 font-medium text-action transition-colors print:border-none " +
    "hover:bg-action-soft aria-expanded:border-action aria-expanded:bg-action-soft",
  tool: "inline-flex min-h-9 items-center gap-1 rounded-sm text-[0.9375rem] text-muted hover:text-action aria-expanded:text-action no-print",
};

/** On a phone a sheet that leaves room for the keyboard on screen; otherwise beside its button. */
const POPOVER =
  "z-20 flex !max-h-[min(34rem,var(--visual-viewport-height,90dvh))] w-[26rem] max-w-[calc(100vw-1rem)] flex-col overflow-hidden rounded-sm border border-line bg-raised text-ink shadow-lg shadow-ink/10 " +
  "max-sm:!fixed max-sm:!inset-2 max-sm:!max-h-none max-sm:!w-auto max-sm:shadow-[0_0_0_100vmax_rgb(0_0_0/0.45)]";

export interface SlotProps {
  /** What the chooser asks; its heading. */
  title: string;
  /** What stands in the sentence. */
  value: ReactNode;
  look?: keyof typeof LOOK;
  /** Invites: nothing is chosen, and it is needed or wanted. */
  isEmpty?: boolean;
  isWide?: boolean;
  children: (close: () => void) => ReactNode;
}

/** A place in the question line, or in the row of tools, that opens a chooser. */
export function Slot({ title, value, look = "line", isEmpty = false, isWide = false, children }: SlotProps) {
  return (
    <DialogTrigger>
      {look === "line" ? (
        // Not a <button>: browsers keep one in a single box, and a long part of the sentence has to wrap like text.
        <Pressable>
          <span role="button" className={`${LOOK.line} ${isEmpty ? "border-dashed border-field" : "border-action/30"}`}>
            {value}
          </span>
        </Pressable>
      ) : (
        <Button className={LOOK.tool}>
          {value}
          <ChevronDown aria-hidden="true" className="size-4" />
        </Button>
      )}
      <Popover placement="bottom start" offset={6} className={`${POPOVER} ${isWide ? "sm:w-[34rem]" : ""}`}>
        <Dialog className="flex min-h-0 flex-1 flex-col outline-none">
          {({ close }) => (
            <>
              <div className="flex items-start justify-between gap-4 px-4 pt-3.5 pb-2">
                <Heading slot="title" className="font-medium">
                  {title}
                </Heading>
                <Button
                  slot="close"
                  aria-label="Close"
                  className="-mt-1 -mr-2 flex size-9 shrink-0 items-center justify-center rounded-sm text-muted hover:text-action"
                >
                  <X aria-hidden="true" className="size-4" />
                </Button>
              </div>
              <div className="flex min-h-0 flex-1 flex-col overflow-y-auto">{children(close)}</div>
            </>
          )}
        </Dialog>
      </Popover>
    </DialogTrigger>
  );
}
