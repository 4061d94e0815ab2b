/** What a column can be of a node table or an edge table. */
export type NodeColumn = 'id' | 'label' | 'entry' | 'earliest' | 'latest';
export type EdgeColumn = 'source' | 'target' | 'weight' | 'time';

const words = (text: string): readonly string[] => text.trim().split(/\s+/);

/** Names in use for the columns of node tables, the likeliest first. */
export const NODE_WORDS: Readonly<Record<NodeColumn, readonly string[]>> = {
  id: words(`id node node_id nodeid key code identifier vertex station station_id species species_id
    taxon site site_id region region_id module file path unit actor person item kennung clave name`),
  label: words(`label name title full_name display_name long_name node_label species_name
    station_name common_name bezeichnung nom nombre description`),
  entry:
    words(`entry eintritt ankunft erstfund arrivée llegada entry_time entry_date entered arrival arrival_time arrival_date arrived
    first_seen firstseen first_detection first_detected first_record first_recorded
    first_observed first_appearance first_date first_day first_year appeared appearance joined
    join_date join_time commissioned commissioning commissioning_date introduced
    introduced_on onset onset_time start start_time start_date added added_on created created_at
    detected since birth birth_time date datetime time timestamp day year month datum fecha jahr année t rank order step
    position`),
  earliest: words(`earliest earliest_entry entry_earliest earliest_date entry_min min_entry min
    lower lower_bound not_before from_date date_from first_possible lo window_start`),
  latest: words(`latest latest_entry entry_latest latest_date entry_max max_entry max upper
    upper_bound not_after until date_to last_possible hi window_end`),
};

/** Names in use for the columns of edge tables, the likeliest first. */
export const EDGE_WORDS: Readonly<Record<EdgeColumn, readonly string[]>> = {
  source:
    words(`source quelle origen von source_id source_node src from from_id from_node fromnodeid from_node_id
    node1 node_1 node_a nodea id1 id_1 id_a start_node sender origin tail parent caller consumer
    predator pollinator species_1 station_1 station_a region_1 region_a a i u`),
  target:
    words(`target ziel cible destino nach target_id target_node dst dest destination to to_id to_node tonodeid
    to_node_id node2 node_2 node_b nodeb id2 id_2 id_b end_node receiver head child callee resource
    prey plant species_2 station_2 station_b region_2 region_b b j v`),
  weight:
    words(`weight gewicht poids peso w value strength count counts n freq frequency correlation corr r score
    similarity amount volume flow rate weight_mean contacts interactions`),
  time: words(`time timestamp date datetime t start start_time start_date first_seen firstseen
    first_contact first_date first_observed observed observed_on entry since when year month day
    created created_at datum fecha onset`),
};

/** A column name as the words above are compared: NFC, lower case, one _ for what is no letter or digit. */
export const wordOf = (name: string): string =>
  name
    .normalize('NFC')
    .replace(/([a-z\d])([A-Z])/g, '$1_$2')
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]+/gu, '_')
    .replace(/^_|_$/g, '');

/** @returns the column that bears the likeliest of the words, or null. */
export function named(columns: readonly string[], synonyms: readonly string[]): string | null {
  const known = columns.map((name) => ({ name, word: wordOf(name), plain: plainOf(name) }));
  for (const synonym of synonyms) {
    const hit = known.find(({ word, plain }) => word === synonym || plain === synonym);
    if (hit) return hit.name;
  }
  return null;
}

const plainOf = (name: string): string => name.normalize('NFC').toLowerCase();

const ALL = new Set([...Object.values(NODE_WORDS), ...Object.values(EDGE_WORDS)].flat());

/** Whether a text is one of the names in use for a column. */
export const isColumnWord = (text: string): boolean =>
  ALL.has(wordOf(text)) || ALL.has(plainOf(text));
