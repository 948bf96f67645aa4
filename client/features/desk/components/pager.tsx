import { Link } from 'react-router-dom';

const linkClass = 'link inline-flex min-h-11 items-center';

/** Where one is in a long list, and the ways back and on. */
export function Pager(props: {
  page: number;
  pageSize: number;
  total: number;
  linkTo: (values: Record<string, string>) => string;
}) {
  const { page, pageSize, total } = props;
  const last = Math.max(1, Math.ceil(total / pageSize));
  if (last === 1) return null;
  return (
    <nav aria-label="Pages" className="flex items-center justify-between gap-6 py-3">
      {page > 1 ? (
        <Link className={linkClass} to={props.linkTo({ page: String(page - 1) })}>
          Back
        </Link>
      ) : (
        <span />
      )}
      <span className="text-soft">
        page {page} of {last}
      </span>
      {page < last ? (
        <Link className={linkClass} to={props.linkTo({ page: String(page + 1) })}>
          On
        </Link>
      ) : (
        <span />
      )}
    </nav>
  );
}
