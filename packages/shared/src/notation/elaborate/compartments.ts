import type { Compartment } from '../../network/network.ts';
import { dimensionOf, printUnit, sameDimension } from '../../units/unit.ts';
import type { AssignmentsSyntax, PlacedSyntax, PlaceSyntax } from '../ast.ts';
import { Failure, makeIt } from '../failure.ts';
import { nearest } from '../nearest.ts';
import { compileFamily } from './families.ts';
import type { Elaboration } from './stage.ts';
import { memberScope } from './scope.ts';
import { refuseUnknownSpecies } from './unknown-species.ts';

const noNames: ReadonlyMap<string, unknown> = new Map();
const litre = [{ symbol: 'L', power: 1 }];

/** The volumes of a text with the species that `in` places in them; the first holds the rest. */
export function readCompartments(stage: Elaboration, places: readonly PlaceSyntax[]): Compartment[] {
  const placed = new Map<string, Set<number>>();
  const compartments: Omit<Compartment, 'species'>[] = [];
  for (const line of stage.tree.lines) {
    if (line.kind !== 'volume') continue;
    for (const item of line.items) {
      const compartment = readVolume(stage, item);
      if (!compartment || placed.has(compartment.name)) continue;
      placed.set(compartment.name, new Set());
      compartments.push(compartment);
    }
  }
  const everywhere = new Set<number>();
  for (const place of places) placeSpecies(stage, place, placed, everywhere);
  return compartments.map((compartment) => ({
    ...compartment,
    species: [...(placed.get(compartment.name) ?? [])],
  }));
}

function readVolume(
  stage: Elaboration,
  item: AssignmentsSyntax['items'][number],
): Omit<Compartment, 'species'> | null {
  const { complaints } = stage;
  const { target, value } = item;
  if (target.indices || item.family) {
    complaints.error(target, 'A volume has a name without index.');
    return null;
  }
  const moving = stage.declarations.movingName(value, noNames);
  if (moving !== null) {
    complaints.error(value, `${moving} changes in time and cannot be part of a volume.`);
    return null;
  }
  const volume = stage.values.of(target.name);
  const isMeasured = value.kind === 'measured';
  if (isMeasured && !sameDimension(dimensionOf(value.unit), dimensionOf(litre))) {
    complaints.error(
      value,
      `${printUnit(value.unit)} is not a unit of volume.`,
      'Use L, fL, um^3 and the like.',
    );
    return null;
  }
  if (volume && volume.value <= 0) complaints.error(value, 'A volume must be positive.');
  if (!volume) {
    complaints.error(value, `${target.name} needs a value: what it draws on has none.`);
    return null;
  }
  const unit = isMeasured ? stage.units.convert(value.unit).to.printed : null;
  return { name: target.name, volume, unit };
}

function placeSpecies(
  stage: Elaboration,
  place: PlaceSyntax,
  placed: ReadonlyMap<string, Set<number>>,
  everywhere: Set<number>,
): void {
  const { compartment } = place;
  const own = placed.get(compartment.name);
  if (!own) {
    const meant = nearest(compartment.name, placed.keys());
    stage.complaints.error(
      compartment,
      `No volume is called ${compartment.name}.`,
      `Give it: volume ${compartment.name} = 1 fL.`,
      meant ? [makeIt(meant, compartment.from, compartment.to)] : [],
    );
    return;
  }
  for (const item of place.species) {
    try {
      placeItem(stage, item, own, everywhere);
    } catch (thrown) {
      stage.complaints.failure(thrown);
    }
  }
}

function placeItem(stage: Elaboration, item: PlacedSyntax, own: Set<number>, everywhere: Set<number>): void {
  const family = compileFamily(item.family, stage.integers, 1, 'places');
  family.forEach((values) => {
    const indices = stage.resolver.indicesOf(item.target.indices, memberScope(family.slots, values));
    const species = stage.species.find(item.target.name, indices);
    if (species < 0) refuseUnknownSpecies(stage, item, indices);
    if (everywhere.has(species)) {
      throw new Failure(item.from, item.to, `${stage.species.nameOf(species)} is placed twice.`);
    }
    everywhere.add(species);
    own.add(species);
  });
}
