import { type Letter, setLetter } from '../letter.ts';

/** After someone signed up with an address that has an account already: the page must not tell, the owner may know. */
export function accountExists(to: string, name: string, link: string): Letter {
  return setLetter({
    to,
    opens: 'nothing',
    subject: 'You already have a Stillroom account',
    name,
    paragraphs: [
      'Someone, probably you, has just tried to open a Stillroom account with this address. It has one already, and nothing was changed.',
      'If you have forgotten the password, set a new one.',
    ],
    action: { words: 'Set a new password', link },
    closing: 'If that was not you, do nothing.',
  });
}
