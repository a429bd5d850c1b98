import { RerunCellEntity, RerunEntity } from './entities/rerun.ts';
import { ReviewEntity } from './entities/review.ts';

export { inviteReviewer } from './commands/invite-reviewer.ts';
export { ReviewEntity } from './entities/review.ts';
export { createReviews, reviewTasks } from './module.ts';
export { reviewsOfRecord } from './review.presenter.ts';
export { shownName } from './state.ts';
export const reviewEntities = [ReviewEntity, RerunEntity, RerunCellEntity];
