import { rerunRequest, reviewInvitation, reviewRemark, verdictRequest } from '@stillroom/shared/contracts';
import { Router } from 'express';
import * as z from 'zod/mini';
import { publicAddress } from '../../config/index.ts';
import { notFound } from '../../errors.ts';
import { route } from '../../http/route.ts';
import { token, uuid } from '../../http/validate.ts';
import type { Services } from '../../services.ts';
import { presentRemarks, writeRemark } from '../notebooks/index.ts';
import { loadRecord, sendRecordFile } from '../records/index.ts';
import { beginRerun } from './commands/begin-rerun.ts';
import { inviteReviewer } from './commands/invite-reviewer.ts';
import { openForReviewer } from './commands/open-review.ts';
import { returnReview } from './commands/return-review.ts';
import { withdrawReview } from './commands/withdraw-review.ts';
import { RerunEntity } from './entities/rerun.ts';
import { openReview, openUnreturnedReview } from './load.ts';
import { authorizeReviewer } from './review.policy.ts';
import { presentRerun, presentReview, presentSummary } from './review.presenter.ts';
import { shownName } from './state.ts';

const recordParams = z.object({ record: uuid });
const reviewParams = z.object({ record: uuid, review: uuid });
const linkParams = z.object({ token });
/** Two texts of 20,000 characters and a judgement of each claim, in bytes. */
const verdictBody = 256 * 1024;

const rerunParams = z.object({ token, rerun: uuid });

/** Invitations to review, and the reviewer's side behind the link. */
export function reviewsRoutes(services: Services): Router {
  const router = Router();

  router.post(
    '/api/records/:record/reviews',
    route(services, {
      limit: 'letters',
      who: 'person',
      params: recordParams,
      body: reviewInvitation,
      status: 201,
      async handle({ person, params, body, manager }) {
        const { record, role } = await loadRecord(manager, person.id, params.record, 'record.invite');
        const address = publicAddress(services.config);
        const { review } = await inviteReviewer(manager, address, person.id, record, body);
        return presentSummary(review, role);
      },
    }),
  );

  router.delete(
    '/api/records/:record/reviews/:review',
    route(services, {
      limit: 'writing',
      who: 'person',
      params: reviewParams,
      async handle({ person, params, manager }) {
        const { record } = await loadRecord(manager, person.id, params.record, 'record.withdraw');
        await withdrawReview(manager, person.id, record, params.review);
      },
    }),
  );

  router.get(
    '/api/review/:token',
    route(services, {
      limit: 'reading',
      who: 'anyone',
      params: linkParams,
      async handle({ params, manager }) {
        const opened = await openReview(manager, params.token);
        authorizeReviewer('review.read');
        await openForReviewer(manager, opened);
        return presentReview(manager, opened);
      },
    }),
  );

  router.get(
    '/api/review/:token/file',
    route(services, {
      limit: 'reading',
      who: 'anyone',
      params: linkParams,
      async handle({ params, manager, response }) {
        const { record } = await openReview(manager, params.token);
        authorizeReviewer('record.export');
        await sendRecordFile(manager, response, record);
      },
    }),
  );

  router.post(
    '/api/review/:token/reruns',
    route(services, {
      limit: 'running',
      who: 'anyone',
      params: linkParams,
      body: rerunRequest,
      status: 201,
      async handle({ params, body, manager }) {
        const opened = await openUnreturnedReview(manager, params.token);
        authorizeReviewer('review.rerun');
        return presentRerun(manager, await beginRerun(manager, opened, body.cell ?? null));
      },
    }),
  );

  router.get(
    '/api/review/:token/reruns/:rerun',
    route(services, {
      limit: 'reading',
      who: 'anyone',
      params: rerunParams,
      async handle({ params, manager }) {
        const { review } = await openReview(manager, params.token);
        authorizeReviewer('review.read');
        const rerun = await manager.findOneBy(RerunEntity, { id: params.rerun, review: review.id });
        if (rerun === null) throw notFound('rerun');
        return presentRerun(manager, rerun);
      },
    }),
  );

  router.post(
    '/api/review/:token/remarks',
    route(services, {
      limit: 'writing',
      who: 'anyone',
      params: linkParams,
      body: reviewRemark,
      status: 201,
      async handle({ params, body, manager }) {
        const { review, record } = await openUnreturnedReview(manager, params.token);
        authorizeReviewer('review.remark');
        const remark = await writeRemark(manager, record.notebook, body, {
          review: review.id,
          reviewer: shownName(review),
          record: record.id,
          recordNumber: record.number,
        });
        return (await presentRemarks(manager, [remark]))[0];
      },
    }),
  );

  router.put(
    '/api/review/:token/verdict',
    route(services, {
      limit: 'writing',
      who: 'anyone',
      params: linkParams,
      body: verdictRequest,
      most: verdictBody,
      async handle({ params, body, manager }) {
        const opened = await openUnreturnedReview(manager, params.token);
        authorizeReviewer('review.verdict');
        await returnReview(manager, opened, body);
      },
    }),
  );

  return router;
}
