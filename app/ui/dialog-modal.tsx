import { Dialog as AriaDialog, Heading, Modal, ModalOverlay } from 'react-aria-components';
import { classNames } from './class-names.ts';
import type { DialogProps } from './dialog.tsx';

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
