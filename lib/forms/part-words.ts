interface PlacedPart {
  readonly pieces: number;
  readonly where: readonly {
    readonly place: string;
    readonly pieces: number;
    readonly shop: string | null;
  }[];
}

/** Who has a part, in words: `here`, `at Tamsin Crank Grinding`, `6 here, 2 on the road`. */
export function sayWhereabouts(part: PlacedPart): string {
  const words = part.where.map(({ place, pieces, shop }) => {
    const at =
      place === 'home' ? 'here' : place === 'partner' ? `at ${shop ?? 'the machine shop'}` : 'on the road';
    return part.pieces === 1 ? at : `${pieces} ${at}`;
  });
  return words.join(', ');
}
