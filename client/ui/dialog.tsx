import { X } from 'lucide-react';
import { useId, useLayoutEffect, useRef } from 'react';
import type { ReactNode } from 'react';
import { createPortal } from 'react-dom';

export interface DialogProps {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: string;
  description?: string;
  children: ReactNode;
}

/** A question over the page: focus stays inside, Escape, the cross and the ground beside it close it. */
export function Dialog(props: DialogProps) {
  return props.open ? createPortal(<OpenDialog {...props} />, document.body) : null;
}

function OpenDialog({ onOpenChange, title, description, children }: DialogProps) {
  const ref = useRef<HTMLDialogElement>(null);
  const id = useId();
  useLayoutEffect(() => {
    const dialog = ref.current;
    dialog?.showModal();
    // Closing before it leaves the page is what gives the focus back to the button that opened it.
    return () => dialog?.close();
  }, []);
  const close = () => onOpenChange(false);
  return (
    <dialog
      ref={ref}
      aria-labelledby={`${id}-title`}
      aria-describedby={description === undefined ? undefined : `${id}-description`}
      onCancel={(event) => {
        if (event.target !== event.currentTarget) return;
        event.preventDefault();
        close();
      }}
      onPointerDown={(event) => {
        if (event.target === event.currentTarget) close();
      }}
      className="m-auto max-h-[90dvh] w-[calc(100%-2rem)] max-w-lg overflow-y-auto rounded-edge border border-line bg-card p-0 text-ink backdrop:bg-shade/55"
    >
      <div className="relative p-6">
        <h2 id={`${id}-title`} className="pr-10 text-title font-heavy">
          {title}
        </h2>
        {description !== undefined && (
          <p id={`${id}-description`} className="mt-1 text-soft">
            {description}
          </p>
        )}
        <div className="mt-4">{children}</div>
        <button
          type="button"
          aria-label="Close"
          onClick={close}
          className="absolute top-4 right-4 grid size-11 place-items-center rounded-control text-soft hover:bg-wash hover:text-ink"
        >
          <X aria-hidden="true" className="size-5" />
        </button>
      </div>
    </dialog>
  );
}
