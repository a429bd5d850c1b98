import { type Letter, setLetter } from '../letter.ts';

/** Tells the owner that the password is another now. */
export function passwordChanged(to: string, name: string, link: string): Letter {
  return setLetter({
    to,
    opens: 'nothing',
    subject: 'Your Stillroom password was changed',
    name,
    paragraphs: ['The password of your account was changed just now, and your other sessions were ended.'],
    action: { words: 'That was not me: set a new password', link },
    closing: 'If it was you, nothing is left to do.',
  });
}
