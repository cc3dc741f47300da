import { bookQuery } from '#contracts/book.ts';
import { defineRoute } from '#server/http/route.ts';
import { showBook } from '#server/services/showBook.ts';

export const GET = defineRoute({
  can: 'read borrower',
  query: bookQuery,
  run: ({ actor, query }) => showBook(actor, query),
});
