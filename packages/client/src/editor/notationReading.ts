import { type Complaint, readNetwork } from '@stillroom/shared/notation';

/** What is wrong or doubtful in a network's text. */
export const checkNotation = (text: string): readonly Complaint[] => readNetwork(text).complaints;
