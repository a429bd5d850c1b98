import { type Letter, setLetter } from '../letter.ts';

/** After signing up: proves the address. */
export function confirmAccount(to: string, name: string, link: string): Letter {
  return setLetter({
    to,
    opens: 'account',
    subject: 'Confirm your address for Stillroom',
    name,
    paragraphs: [
      'You have opened an account at Stillroom. One step is left: confirm that this address is yours.',
    ],
    action: { words: 'Confirm the address', link },
    closing: 'The link works for two days, once. If you did not open an account, do nothing.',
  });
}
