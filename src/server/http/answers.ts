/** Answers of a route other than 200 with a body. */

/** 201 with the address of what was made. */
export const created = (location: string, value: unknown): Response =>
  Response.json(value, { status: 201, headers: { location } });

/** 204: done, and nothing to say. */
export const noContent = (): Response => new Response(null, { status: 204 });
