import { type Letter, setLetter } from '../letter.ts';

interface ReviewInvitation {
  readonly to: string;
  readonly name: string;
  readonly by: string;
  readonly group: string;
  /** "record No. 3, Diacetyl rest". */
  readonly record: string;
  readonly message: string;
  readonly until: string;
  readonly link: string;
}

/** Gives a reviewer the link to one record. */
export function reviewInvitation(asked: ReviewInvitation): Letter {
  const { to, name, by, group, record, message, until, link } = asked;
  return setLetter({
    to,
    opens: 'record',
    subject: `To review: ${record}`,
    ...(name === '' ? {} : { name }),
    paragraphs: [
      `${by} of ${group} asks you to review ${record}, the frozen working behind a manuscript.`,
      'The link opens it without a password. You can rerun every cell on our machine, see whether each result matches the record, and leave remarks and a verdict. You cannot change anything in it.',
    ],
    quote: { by, words: message },
    action: { words: 'Open the record', link },
    closing: `The link is yours alone and works until ${until}; do not pass it on.`,
  });
}
