import { sentenceOf } from '../lib/problem-error.ts';
import { Button } from './button.tsx';
import { Notice } from './notice.tsx';

/** What went wrong in one sentence, and the way on. */
export function ErrorPanel(props: {
  error: unknown;
  title?: string;
  /** The panel is all there is on its page, and so carries the page's heading. */
  isPage?: boolean;
  onRetry?: () => void;
}) {
  const title = props.title ?? 'This could not be loaded';
  return (
    <Notice tone="danger" urgent title={props.isPage === true ? <h1>{title}</h1> : title}>
      <p>{sentenceOf(props.error)}</p>
      {props.onRetry !== undefined && (
        <Button look="danger" size="small" className="mt-3" onClick={props.onRetry}>
          Try again
        </Button>
      )}
    </Notice>
  );
}
