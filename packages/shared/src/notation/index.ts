export type { Complaint, NotationReading } from './complaint.ts';
