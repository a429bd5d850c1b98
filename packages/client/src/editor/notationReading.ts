import { type Complaint, parseNetwork } from '@stillroom/shared/notation';

/** What is wrong or doubtful in a network's text. */
export const checkNotation = (text: string): readonly Complaint[] => parseNetwork(text).complaints;
