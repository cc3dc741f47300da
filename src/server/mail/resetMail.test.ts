import { expect, test } from 'vitest';
import { resetMail } from './resetMail.ts';

const LINK = 'https://underkeel.lender.example/reset-password?token=abc';

test('the mail gives the link in both its forms, with how long it holds, and nothing of the reader in the subject', () => {
  const mail = resetMail({ name: 'Ada <b>North', link: LINK, minutes: 30 });
  expect(mail.subject).toBe('Underkeel: set a new password');
  expect(mail.text).toContain(LINK);
  expect(mail.html).toContain(`href="${LINK}"`);
  for (const body of [mail.text, mail.html]) expect(body).toContain('for 30 minutes');
  expect(mail.html).toContain('Ada &lt;b&gt;North');
  expect(mail.html).not.toContain('<b>North');
});
