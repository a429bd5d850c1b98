import { LetterShowingEntity } from './entities/letter-showing.ts';
import { MailEntity } from './entities/mail.ts';

export { accountExists } from './letters/account-exists.ts';
export { confirmAccount } from './letters/confirm-account.ts';
export { groupInvitation } from './letters/group-invitation.ts';
export { newPassword } from './letters/new-password.ts';
export { passwordChanged } from './letters/password-changed.ts';
export { reviewInvitation } from './letters/review-invitation.ts';
export { MailEntity } from './entities/mail.ts';
export type { Letter } from './letter.ts';
export {
  countOutbox,
  lettersShownOf,
  loadSealedLetter,
  queueMail,
  readOutbox,
  recordShowing,
} from './outbox.ts';
export { createPostman } from './postman.ts';
export const mailEntities = [MailEntity, LetterShowingEntity];
