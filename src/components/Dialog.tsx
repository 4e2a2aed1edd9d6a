import type { ReactNode } from "react";
import { Dialog as AriaDialog, Heading, Modal, ModalOverlay } from "react-aria-components";
import { messageOf } from "../lib/form.ts";
import { Button } from "./Button.tsx";
import { Notice } from "./Notice.tsx";

export interface DialogProps {
  title: string;
  isOpen: boolean;
  onClose: () => void;
  /** `alertdialog` where a decision is asked for. */
  role?: "dialog" | "alertdialog";
  /** False keeps it open when Escape is pressed or the page behind is clicked. */
  isDismissable?: boolean;
  children: ReactNode;
}

/** A sheet over the page; the focus stays inside and goes back to where it came from. */
export function Dialog({ title, isOpen, onClose, role = "dialog", isDismissable = true, children }: DialogProps) {
  return (
    <ModalOverlay
      isOpen={isOpen}
      onOpenChange={(isOpenNow) => !isOpenNow && onClose()}
      isDismissable={isDismissable}
      isKeyboardDismissDisabled={!isDismissable}
      className="fixed inset-0 z-20 flex items-end justify-center overflow-y-auto bg-black/45 p-3 sm:items-center"
    >
      <Modal className="w-full max-w-lg rounded-sm bg-paper text-ink shadow-xl">
        <AriaDialog role={role} className="max-h-[calc(100dvh-2rem)] overflow-y-auto p-6 outline-none sm:p-8">
          <Heading slot="title" className="text-xl font-light">
            {title}
          </Heading>
          <div className="mt-4">{children}</div>
        </AriaDialog>
      </Modal>
    </ModalOverlay>
  );
}

export interface ConfirmDialogProps {
  title: string;
  isOpen: boolean;
  onClose: () => void;
  /** The act in its own words, such as "Publish". */
  confirm: string;
  onConfirm: () => void;
  isPending: boolean;
  error: Error | null;
  isDanger?: boolean;
  /** What it does, and what can't be taken back. */
  children: ReactNode;
}

/** Asks before an act whose effects others feel. */
export function ConfirmDialog({
  title,
  isOpen,
  onClose,
  confirm,
  onConfirm,
  isPending,
  error,
  isDanger = false,
  children,
}: ConfirmDialogProps) {
  return (
    <Dialog title={title} isOpen={isOpen} onClose={onClose} role="alertdialog">
      <div className="space-y-3">{children}</div>
      {error && (
        <div className="mt-4">
          <Notice kind="wrong">{messageOf(error)}</Notice>
        </div>
      )}
      <div className="mt-6 flex flex-wrap justify-end gap-3">
        <Button onPress={onClose} autoFocus>
          Leave it
        </Button>
        <Button kind={isDanger ? "danger" : "primary"} onPress={onConfirm} isPending={isPending}>
          {confirm}
        </Button>
      </div>
    </Dialog>
  );
}
