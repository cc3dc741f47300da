import { renderMail, type RenderedMail } from './mailDocument.ts';

/** The link to set a new password; it says how long it holds and what to do where nobody asked for it. */
export function resetMail(to: {
  name: string;
  link: string;
  minutes: number;
}): RenderedMail & { subject: string } {
  const subject = 'Underkeel: set a new password';
  const body = renderMail(subject, [
    { part: 'title', text: 'Set a new password' },
    {
      part: 'paragraph',
      text: `${to.name}, somebody, probably you, asked for a link to set a new password. It works once, for ${to.minutes} minutes.`,
    },
    { part: 'link', label: 'Set a new password', url: to.link },
    {
      part: 'quiet',
      text: 'Where it was not you, leave it: your password stays as it is. Tell your administrator if such mail keeps coming.',
    },
  ]);
  return { subject, ...body };
}
