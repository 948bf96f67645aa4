import { sentenceOf } from '../lib/problem-error.ts';
import { Button } from './button.tsx';
import { Notice } from './notice.tsx';

/** What went wrong in one sentence, and the way on. */
export function ErrorPanel(props: { error: unknown; title?: string; onRetry?: () => void }) {
  return (
    <Notice tone="danger" urgent title={props.title ?? 'This could not be loaded'}>
      <p>{sentenceOf(props.error)}</p>
      {props.onRetry !== undefined && (
        <Button look="danger" size="small" className="mt-3" onClick={props.onRetry}>
          Try again
        </Button>
      )}
    </Notice>
  );
}
