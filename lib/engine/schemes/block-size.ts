/**
 * Faces (Doo-Sabin: vertices) that are refined at once where more are left: enough that the ring around a block is a few per cent of it, few enough that its
 * finer levels take some ten megabytes whatever the cage.
 */
export const BLOCK_SIZE = 12_000;
