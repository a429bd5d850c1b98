import {
  cellKinds,
  cellRegistry,
  findReferences,
  freshName,
  isCellName,
  mapReferences,
  settingsComplaint,
} from '@stillroom/shared/cells';
import { describe, expect, test } from 'vitest';

describe('every kind', () => {
  test.each(cellKinds)(
    '%s: an empty cell has settings that the kind takes, and refuses what it does not know',
    (kind) => {
      const { empty, settings } = cellRegistry[kind];
      expect(cellRegistry[kind].kind).toBe(kind);
      expect(settings.safeParse(empty.settings).success).toBe(true);
      expect(settingsComplaint(kind, { ...empty.settings, unheardOf: 1 })).toBe(
        `This ${kind} has no setting called "unheardOf".`,
      );
    },
  );

  test('new names are names, and free', () => {
    for (const kind of cellKinds) {
      const name = freshName(kind, ['run1', 'run2', 'network1']);
      if (kind === 'prose') expect(name).toBe('');
      else expect(isCellName(name)).toBe(true);
    }
    expect(freshName('trajectory', ['run1', 'run2'])).toBe('run3');
  });
});

describe('names of cells in settings', () => {
  const settings = {
    draw: [
      { cell: 'run1', x: 'times', y: [] },
      { cell: 'run2', x: 'times', y: [] },
    ],
    mark: 'line',
  };

  test('are found in order', () => {
    expect(findReferences(cellRegistry.plot, settings).map(({ name }) => name)).toEqual(['run1', 'run2']);
    expect(findReferences(cellRegistry.script, { draws: ['a', 'b'] }).map(({ name }) => name)).toEqual([
      'a',
      'b',
    ]);
    expect(findReferences(cellRegistry.trajectory, { network: '' })[0]).toMatchObject({
      name: '',
      kind: 'network',
    });
  });

  test('are followed when a cell is renamed, and nothing else changes', () => {
    const renamed = mapReferences(cellRegistry.plot, settings, (name) => (name === 'run1' ? 'course' : name));
    expect(renamed).toEqual({
      ...settings,
      draw: [{ ...settings.draw[0], cell: 'course' }, settings.draw[1]],
    });
    expect(settings.draw[0]?.cell).toBe('run1');
  });

  test('settings of a wrong form hold none', () => {
    for (const draw of [null, 'run1', 5, [null], [['cell']]]) {
      expect(findReferences(cellRegistry.plot, { draw })).toEqual([]);
    }
  });
});
