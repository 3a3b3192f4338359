/** What a reader must bear in mind before anything is done on the ground of these numbers. Stands in every report and export. */
export const CARE_NOTES: readonly string[] = [
  'Not a legal height: heights for legal, cadastral or construction use are those of the national height authority or of a licensed surveyor.',
  'Fibre and free-space work asks for the laser safety officer; shafts, roofs and towers for the rules of the site; the transport of clocks and cells for those of the carrier.',
  'The measurements must carry every correction of clocks and links except gravity’s; a published offset may have it removed already.',
];
