import { Link } from 'react-router-dom';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { Button } from '../../../ui/button.tsx';
import type { ButtonLook } from '../../../ui/button.tsx';
import { usePutInBasket } from '../api/basket.ts';

export interface PutInBasketProps {
  token: string;
  quantity: number;
  basketPath: string;
  look?: ButtonLook;
  disabled?: boolean;
  /** Tells one button from the next for those who hear them in a row. */
  about: string;
}

/** The button, and beside it what came of it. */
export function PutInBasket(props: PutInBasketProps) {
  const put = usePutInBasket();
  return (
    <div className="flex flex-col items-end gap-1">
      <Button
        look={props.look}
        disabled={props.disabled}
        busy={put.isPending}
        busyWords="Putting it in"
        onClick={() => put.mutate({ token: props.token, quantity: props.quantity })}
      >
        {put.isSuccess ? 'Put in another' : 'Put in basket'}
        <span className="sr-only">: {props.about}</span>
      </Button>
      <p aria-live="polite" className="text-small">
        {put.isSuccess && (
          <>
            It is in.{' '}
            <Link className="link inline-block py-0.5" to={props.basketPath}>
              See the basket
            </Link>
          </>
        )}
        {put.isError && <span className="font-strong text-brick">{sentenceOf(put.error)}</span>}
      </p>
    </div>
  );
}
