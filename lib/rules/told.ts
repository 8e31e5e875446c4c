/** Who is told of a show, a shot or an asset. */
export interface ToldAnswer {
  /** The reader asked to be told of this very place. */
  told: boolean;
  /** The reader is told of it as one of the whole show. */
  told_of_show: boolean;
  /** Everybody who asked, for this place or for the whole show; by name. */
  people: { name: string; email: string }[];
}

/** Something that a person asked to be told of: a show, or one shot or asset of it. */
export interface ToldPlace {
  show: string;
  title: string;
  shot: string | null;
  asset: string | null;
}
