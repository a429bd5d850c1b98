import type { RemarkView } from '@stillroom/shared/contracts';
import { type EntityManager, In } from 'typeorm';
import { findPeople, presentPerson } from '../auth/index.ts';
import { RemarkAnswerEntity, type RemarkEntity } from './entities/remark.ts';

/** Remarks with their answers, as members see them; reviewers stay as masked as they were when they wrote. */
export async function presentRemarks(
  manager: EntityManager,
  remarks: readonly RemarkEntity[],
): Promise<RemarkView[]> {
  const answers = await manager.find(RemarkAnswerEntity, {
    where: { remark: In(remarks.map(({ id }) => id)) },
    order: { at: 'ASC' },
  });
  const ids = [
    ...remarks.flatMap(({ by, settledBy }) => [by ?? [], settledBy ?? []].flat()),
    ...answers.map(({ by }) => by),
  ];
  const people = await findPeople(manager, ids);
  const person = (id: string) => {
    const found = people.get(id);
    return found === undefined ? { id, name: 'Someone', initials: '?', hue: 0 } : presentPerson(found);
  };
  return remarks.map((remark) => ({
    id: remark.id,
    cell: remark.cell,
    quote: remark.quote,
    text: remark.text,
    by: remark.by === null ? presentReviewer(remark.reviewer ?? 'Reviewer') : person(remark.by),
    at: remark.at.toISOString(),
    fromReview:
      remark.record === null || remark.recordNumber === null
        ? null
        : { record: remark.record, number: remark.recordNumber },
    answers: answers
      .filter((answer) => answer.remark === remark.id)
      .map(({ id, text, by, at }) => ({ id, text, by: person(by), at: at.toISOString() })),
    settled:
      remark.settledAt === null || remark.settledBy === null
        ? null
        : { by: person(remark.settledBy), at: remark.settledAt.toISOString() },
  }));
}

/** A reviewer as the authors see them: a name, no account. */
const presentReviewer = (name: string) => ({ ...presentPerson({ id: '', name, hue: 5 }), id: null });
