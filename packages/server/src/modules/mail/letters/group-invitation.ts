import { type Letter, setLetter } from '../letter.ts';

interface Invitation {
  readonly to: string;
  readonly by: string;
  readonly group: string;
  /** "an author", "a reader of two notebooks". */
  readonly role: string;
  readonly message: string;
  readonly until: string;
  readonly link: string;
}

/** Asks someone into a group. */
export function groupInvitation({ to, by, group, role, message, until, link }: Invitation): Letter {
  return setLetter({
    to,
    opens: 'group',
    subject: `${by} invites you to ${group} on Stillroom`,
    paragraphs: [
      `${by} invites you to join the group ${group} as ${role}. Stillroom is where the group writes its notebooks on reaction networks.`,
    ],
    quote: { by, words: message },
    action: { words: `Join ${group}`, link },
    closing: `The invitation is good until ${until}. If you do not know ${by}, do nothing.`,
  });
}
