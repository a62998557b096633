import { afterEach, describe, expect, it } from 'vitest';
import { startMailCatcher, type MailCatcher } from '../../api/lib/mail-catcher.ts';
import { createMailer, type Mailer } from '../../api/lib/mailer.ts';

let catcher: MailCatcher;
let mailer: Mailer;
afterEach(async () => {
  mailer.close();
  await catcher.close();
});

describe('a letter sent over SMTP', () => {
  it('arrives as it was written, accents, long lines and links included', async () => {
    catcher = await startMailCatcher(undefined);
    mailer = createMailer(catcher.url, 'Slipstone <slipstone@school.test>');
    const text = `Dear Zoë,\n\n“Two brackets” is open: http://school.test/rounds/1?x=1&y=2\n${'long '.repeat(60)}end\n`;
    const html = `<p>Dear Zoë, “Two brackets” is open.</p>`;
    await mailer.send({
      to: 'zoe@school.test',
      subject: 'Öffnung — “Two brackets” is open to you now',
      text,
      html,
      headers: { 'X-Kind': 'a' },
    });
    await mailer.send({ to: 'b@school.test', subject: 'Second', text: 'plain', html: '<p>plain</p>', headers: {} });
    const [second, first] = catcher.list();
    expect(second).toMatchObject({ id: 2, to: 'b@school.test', subject: 'Second' });
    expect(first?.subject).toBe('Öffnung — “Two brackets” is open to you now');
    expect(first?.to).toBe('zoe@school.test');
    expect(first?.text.trim()).toBe(text.trim());
    expect(first?.html.trim()).toBe(html);
  });
});
