import type { ReactNode } from 'react';
import { Dialog as AriaDialog, Heading, Modal, ModalOverlay } from 'react-aria-components';
import { classNames } from './class-names.ts';

export interface DialogProps {
  readonly isOpen: boolean;
  readonly onClose: () => void;
  readonly title: string;
  /** What cannot be undone is framed in ink. */
  readonly grave?: boolean;
  /** Cannot be left while something is under way. */
  readonly isLocked?: boolean;
  readonly children: ReactNode;
}

/** The dialog itself; loaded when the first one opens. */
export function DialogModal({ title, onClose, grave, children, isLocked }: Omit<DialogProps, 'isOpen'>) {
  return (
    <ModalOverlay
      className="veil"
      isOpen
      isDismissable={!isLocked}
      isKeyboardDismissDisabled={isLocked}
      onOpenChange={(isOpen) => {
        if (!isOpen) onClose();
      }}
    >
      <Modal className={classNames('dialog', grave && 'grave')}>
        <AriaDialog role={grave ? 'alertdialog' : 'dialog'}>
          <Heading slot="title" level={2}>
            {title}
          </Heading>
          {children}
        </AriaDialog>
      </Modal>
    </ModalOverlay>
  );
}
