export interface PagerProps {
  readonly page: number;
  readonly perPage: number;
  readonly total: number;
  /** "alerts" */
  readonly what: string;
  /** Address of a page, so that it can be opened and sent; `onPage` takes a plain press in an island. */
  readonly hrefOf: (page: number) => string;
  readonly onPage?: (page: number) => void;
}

/** "51 to 100 of 312 borrowers", with the pages before and after. */
export function Pager({ page, perPage, total, what, hrefOf, onPage }: PagerProps) {
  const first = Math.min((page - 1) * perPage + 1, total);
  const last = Math.min(page * perPage, total);
  const pages = Math.max(1, Math.ceil(total / perPage));
  return (
    <nav className="table-foot" aria-label={`Pages of ${what}`}>
      <p className="type-second">
        {total === 0 ? `No ${what}` : `${first} to ${last} of ${total.toLocaleString('en-GB')} ${what}`}
      </p>
      {pages > 1 && (
        <div className="flex gap-4">
          <PageLink
            to={page - 1}
            live={page > 1}
            hrefOf={hrefOf}
            onPage={onPage}
            rel="prev"
            name="Page before"
          />
          <span className="type-second">
            Page {page} of {pages}
          </span>
          <PageLink
            to={page + 1}
            live={page < pages}
            hrefOf={hrefOf}
            onPage={onPage}
            rel="next"
            name="Next page"
          />
        </div>
      )}
    </nav>
  );
}

interface PageLinkProps extends Pick<PagerProps, 'hrefOf' | 'onPage'> {
  readonly to: number;
  readonly live: boolean;
  readonly rel: 'prev' | 'next';
  readonly name: string;
}

function PageLink({ to, live, hrefOf, onPage, rel, name }: PageLinkProps) {
  if (!live) return <span className="type-second">{name}</span>;
  return (
    <a
      href={hrefOf(to)}
      rel={rel}
      onClick={(event) => {
        if (!onPage || event.ctrlKey || event.metaKey || event.shiftKey) return;
        event.preventDefault();
        onPage(to);
      }}
    >
      {name}
    </a>
  );
}
