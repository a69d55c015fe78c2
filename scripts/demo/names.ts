/** Invented people: first and family names that are combined by the seeded generator. */
export const FIRST_NAMES: Record<string, string[]> = {
  PL: ['Agata', 'Bogdan', 'Celina', 'Daria', 'Emil', 'Grażyna'],
  DE: ['Anke', 'Bernd', 'Carla', 'Detlef', 'Elke', 'Frieda'],
  ES: ['Alba', 'Benito', 'Clara', 'Diego', 'Elena', 'Fermín'],
  IT: ['Anna', 'Bruno', 'Chiara', 'Dario', 'Elisa', 'Fulvio'],
  SE: ['Astrid', 'Bengt', 'Cecilia', 'David', 'Elsa', 'Folke'],
  GB: ['Alice', 'Bernard', 'Caroline', 'Duncan', 'Esther', 'Frank'],
  CZ: ['Alena', 'Bohumil', 'Dana', 'Eliška', 'Filip', 'Hana'],
  PT: ['Amélia', 'Bernardo', 'Catarina', 'Duarte', 'Eduarda', 'Filipe'],
  RO: ['Adela', 'Bogdana', 'Corina', 'Dragoș', 'Elena', 'Florin'],
};

export const FAMILY_NAMES: Record<string, string[]> = {
  PL: ['Zarębska', 'Okoń', 'Lisiecka', 'Wrona', 'Górniak', 'Turska'],
  DE: ['Ohlsen', 'Reimers', 'Tietz', 'Hagemann', 'Vossberg', 'Lüders'],
  ES: ['Arnedo', 'Belmonte', 'Carrizo', 'Durango', 'Espadas', 'Fuenmayor'],
  IT: ['Albanese', 'Brizzi', 'Corsini', 'Donati', 'Esposto', 'Ferrante'],
  SE: ['Almgren', 'Bergdahl', 'Carling', 'Dahlström', 'Edvall', 'Forsgren'],
  GB: ['Ashdown', 'Birtwell', 'Cotterill', 'Dunmore', 'Eastlake', 'Farrow'],
  CZ: ['Adámková', 'Beneš', 'Čapek', 'Doležal', 'Exnerová', 'Fialová'],
  PT: ['Arruda', 'Bettencourt', 'Cordeiro', 'Drumond', 'Escada', 'Farinha'],
  RO: ['Anghelescu', 'Bratu', 'Crețu', 'Dumbravă', 'Enescu', 'Florea'],
};
