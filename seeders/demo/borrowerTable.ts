/** The invented book: names of no firm or place that is known, each with its sector, desk and story. */
import type { SectorName } from './sectorProfiles.ts';

export const SCENARIOS = [
  'healthy',
  'thin headroom',
  'just passing on add-backs',
  'met only with add-backs',
  'growing fast',
  'seasonal',
  'not met and waived',
  'interest cover not met',
  'restated',
  'ratio without meaning',
  'net cash',
  'quality fell',
  'step-down ahead',
  'step-down later',
  'late',
  'late within grace',
  'thin current ratio',
  'thin liquidity',
  'covenant holiday',
  'in cure period',
  'cured by its owners',
  'cured by the next test',
  'springing revolver',
  'our own triggers',
] as const;
export type Scenario = (typeof SCENARIOS)[number];

export const DESK_NAMES = ['Northern desk', 'Harbour desk'] as const;
export type DeskName = (typeof DESK_NAMES)[number];

export interface BorrowerRow {
  readonly name: string;
  readonly sector: SectorName;
  readonly desk: DeskName;
  readonly scenario: Scenario;
  readonly country: string;
}

const COUNTRIES_BY_SUFFIX: readonly (readonly [string, string])[] = [
  [' GmbH', 'DE'],
  [' AG', 'AT'],
  [' B.V.', 'NL'],
  [' SAS', 'FR'],
  [' S.L.', 'ES'],
  [' Oy', 'FI'],
  [' Designated Activity Company', 'IE'],
  [' Ltd', 'GB'],
  [' plc', 'GB'],
  [' LLP', 'GB'],
];

const ROWS: readonly (readonly [string, SectorName, 'N' | 'H', Scenario?])[] = [
  ['Ostervane Metallbau GmbH', 'metal', 'N', 'just passing on add-backs'],
  ['Corvandel Fabrications Ltd', 'metal', 'N', 'quality fell'],
  ['Hallmarrow Steelwork Ltd', 'metal', 'N', 'restated'],
  ['Brenningsund Forge Oy', 'metal', 'N'],
  ['Kaldermarrow Pressings Ltd', 'metal', 'H'],
  ['Tervanholt Guss GmbH', 'metal', 'N'],
  ['Quarrendell Castings Ltd', 'metal', 'N', 'in cure period'],
  ['Sundrelle Profils SAS', 'metal', 'H'],
  ['Vestrigen Stahlbau GmbH', 'metal', 'N', 'thin headroom'],
  ['Marrowicke Tubes Ltd', 'metal', 'H'],
  ['Eskelvand Fastenings B.V.', 'metal', 'N', 'cured by its owners'],
  ['Dornharrel Weldments GmbH', 'metal', 'N'],
  ['Pelligrande Traitements SAS', 'metal', 'H'],
  ['Aldermerrin Trade B.V.', 'wholesale', 'H', 'late'],
  ['Fennimarrow Supplies Ltd', 'wholesale', 'N', 'thin headroom'],
  ['Grunvelder Handel GmbH', 'wholesale', 'N', 'met only with add-backs'],
  ['Otterbrane Wholesale Ltd', 'wholesale', 'H'],
  ['Castelvanne Distribution SAS', 'wholesale', 'H', 'thin current ratio'],
  ['Halvorune Building Supplies Oy', 'wholesale', 'N'],
  ['Merrinstowe Catering Supply Ltd', 'wholesale', 'N'],
  ['Norvaquel Elektro GmbH', 'wholesale', 'N'],
  ['Rastevolde Parts B.V.', 'wholesale', 'H'],
  ['Tolvarnel Medical Supply Designated Activity Company', 'wholesale', 'N'],
  ['Wexelunde Papier AG', 'wholesale', 'N', 'cured by the next test'],
  ['Yarrovane Timber Ltd', 'wholesale', 'H'],
  ['Bramblewyke Preserves Ltd', 'food', 'N', 'seasonal'],
  ['Crestavelle Boulangerie SAS', 'food', 'H'],
  ['Dairenholme Cheese B.V.', 'food', 'H'],
  ['Elmsgarrow Meats Ltd', 'food', 'N', 'step-down ahead'],
  ['Fosseldine Mills Ltd', 'food', 'N', 'springing revolver'],
  ['Gallendra Aceites S.L.', 'food', 'H'],
  ['Hirsevald Cerealien GmbH', 'food', 'N'],
  ['Ivenmorrow Dairies Designated Activity Company', 'food', 'H'],
  ['Juniverre Confiserie SAS', 'food', 'H', 'late within grace'],
  ['Larkendry Frozen Foods Ltd', 'food', 'N'],
  ['Mosswerrin Soups Ltd', 'food', 'N'],
  ['Solvarde Fish Products Oy', 'food', 'H'],
  ['Antrevold Pumpen GmbH', 'machinery', 'N', 'ratio without meaning'],
  ['Bexterholme Packaging Machines B.V.', 'machinery', 'H', 'growing fast'],
  ['Cindrevall Conveyors Ltd', 'machinery', 'N'],
  ['Drostenval Hydraulik GmbH', 'machinery', 'N', 'step-down later'],
  ['Fjelvane Lifts Oy', 'machinery', 'H'],
  ['Gantrimarrow Cranes Ltd', 'machinery', 'N'],
  ['Helmsvarde Armaturen AG', 'machinery', 'N', 'our own triggers'],
  ['Inverkolt Presses Ltd', 'machinery', 'H'],
  ['Lumeverra Software GmbH', 'software', 'N', 'growing fast'],
  ['Nethervane Systems Ltd', 'software', 'N', 'net cash'],
  ['Orrindelle Logiciels SAS', 'software', 'H'],
  ['Quillstrande Computing B.V.', 'software', 'H'],
  ['Tessarune Analytics Ltd', 'software', 'N'],
  ['Vantelorne Networks plc', 'software', 'N'],
  ['Carrovende Haulage Ltd', 'transport', 'N', 'interest cover not met'],
  ['Langstradel Spedition GmbH', 'transport', 'N'],
  ['Nordvelle Tramway Concession Ltd', 'transport', 'H'],
  ['Stradomarrel Logistique SAS', 'transport', 'H', 'thin liquidity'],
  ['Bautreske Bedachung GmbH', 'construction', 'N', 'not met and waived'],
  ['Kelvarrow Facades Ltd', 'construction', 'H'],
  ['Plintmarrow Groundworks LLP', 'construction', 'N'],
  ['Pinevarra Resorts S.L.', 'hotels', 'H', 'seasonal'],
  ['Dunemorrel Hotels B.V.', 'hotels', 'H', 'covenant holiday'],
];

export const BORROWER_ROWS: readonly BorrowerRow[] = ROWS.map(([name, sector, desk, scenario]) => {
  const country = COUNTRIES_BY_SUFFIX.find(([suffix]) => name.endsWith(suffix))?.[1];
  if (!country) throw new Error(`no country for ${name}`);
  return {
    name,
    sector,
    desk: desk === 'N' ? 'Northern desk' : 'Harbour desk',
    scenario: scenario ?? 'healthy',
    country,
  };
});
