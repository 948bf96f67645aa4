import * as Radix from '@radix-ui/react-dialog';
import { X } from 'lucide-react';
import type { ReactNode } from 'react';

/** A question over the page: focus stays inside, Escape and the cross close it. */
export function Dialog(props: {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: string;
  description?: string;
  children: ReactNode;
}) {
  return (
    <Radix.Root open={props.open} onOpenChange={props.onOpenChange}>
      <Radix.Portal>
        <Radix.Overlay className="fixed inset-0 z-40 bg-shade/55" />
        <Radix.Content
          className="fixed inset-x-4 top-1/2 z-50 mx-auto max-h-[90dvh] max-w-lg -translate-y-1/2 overflow-y-auto rounded-edge border border-line bg-card p-6 text-ink"
          {...(props.description === undefined ? { 'aria-describedby': undefined } : {})}
        >
          <Radix.Title className="pr-10 text-title font-heavy">{props.title}</Radix.Title>
          {props.description !== undefined && (
            <Radix.Description className="mt-1 text-soft">{props.description}</Radix.Description>
          )}
          <div className="mt-4">{props.children}</div>
          <Radix.Close
            aria-label="Close"
            className="absolute top-4 right-4 grid size-11 place-items-center rounded-control text-soft hover:bg-wash hover:text-ink"
          >
            <X aria-hidden="true" className="size-5" />
          </Radix.Close>
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  );
}
