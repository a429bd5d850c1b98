import { type Letter, setLetter } from '../letter.ts';

/** After a password was forgotten. */
export function newPassword(to: string, name: string, link: string): Letter {
  return setLetter({
    to,
    opens: 'account',
    subject: 'Set a new password for Stillroom',
    name,
    paragraphs: ['A new password was asked for your account. Setting it ends all your sessions.'],
    action: { words: 'Set a new password', link },
    closing:
      'The link works for one hour, once. If you did not ask for it, do nothing: the old password stays.',
  });
}
