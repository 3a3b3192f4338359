/** What a reader must bear in mind before anything is done on the ground of these numbers. Stands in every report and export. */
export const CARE_NOTES: readonly string[] = [
  'Not a legal height: legal, cadastral and construction work turns to the national height authority or a licensed surveyor.',
  'Lasers ask for the laser safety officer; shafts, roofs and towers for the rules of the site; moving clocks for those of the carrier.',
  'Measured offsets carry every correction of clocks and links except gravity’s.',
];
