/** Widths of the columns of an import's files, opener first. */
export const FILE_COLUMNS = '1.25rem minmax(13rem,1.5fr) 6.5rem minmax(7rem,0.8fr) 5rem 3.5rem 5.5rem 13rem minmax(14rem,2fr)';
