/**
 * Invented people: family names coined or rare, from many tongues, within Latin-1; no real person is meant. Those of staff
 * and cast are not here.
 */
const listed = (names: string): readonly string[] => names.trim().split(/\s+/);

export const familyNames = listed(`
  Abernoth Achterwold Adeyinwa Ainsbrook Alcázaro Amberdale Andreasdal Aroldsen Ashgrove-Tanaki
  Balewicz Barrowmere Bellavigna Bergqvistad Bhattarkar Birchenall Blåsjö Bonifaciu Brackenhurst
  Brandvoll Caldermoor Camposeco Chadwarani Chenoweth-Ruiz Cloverdane Coldharbor Corvalho
  Dallimore Dandekari Delacourtine Dembowale Dragomirov Drinkwater Dusablon Eastermoor Ekundara
  Engelström Espírito-Vale Farrowgate Fennimoor Fjeldmark Fontanárez Foxworthy Gallowglen
  Garrowby Gebreyohan Giménez-Alba Glasswright Goldenthal Greavesmith Grünbeck Hallowfield
  Hanamori Harbeck Hazeldine-Okoro Heatherbell Hoangthi Hollenbach Hyunseok Ibarrondo Iddrisani
  Inglesfield Iwasegawa Jagannathi Jökulsdal Kamalani Kesselring-Moreau Khourasani Kingfisher
  Kowalczuk Lachapelle-Dubois Larkspur Lindenauer Lockridge Longacre Löwenhardt Maddoxley
  Marchetani Mårdstrand Meadowcroft Menghistu Millthorpe Montecalvo Moonaghan Mwangale Nakamori
  Narayanappa Nethercott Nuñezarra Oakhanger Obradovac Odukwere Ohlendorf Okafori Olivarez
  Orchardson Østergren Pallavicho Pemberwick Penhallow Peñascal Petrosyani Pickersgale
  Poindextre Quillfeather Quistgaard Radziwon Ravensbourne Redfeather Rosenquist-Bell
  Rothermere-Adeyemi Saltmarsh Sandoval-Reyes Schreibvogel Seagrave Shimabuku Silverthorne
  Sørvik Stavrakos Stonehewer Strömvall Swanscombe Szalonta Tamatea Tanglewood Tessaro Tollivane
  Trevannion Tshabangu Underhay Upchurch Valdemora Vandersloot Vasconcelhos Villasante
  Wadhwanath Wainscott Whitlocke Wolverdene Wyndhamer Yamashiro-Lee Yellowlees Ysenberg
  Zachariades Zambrano-Gil Zielonka
`);

export const womensNames = listed(`
  Adaeze Agnès Amina Anjali Annelise Araceli Bernadette Birgitta Caridad Cecily Chiyo Claudette
  Concepción Delphine Dorothea Edwina Eleonora Esperanza Eulalie Fatoumata Fern Genoveva Gudrun
  Hanneke Harriet Henrietta Imogen Ingeborg Ioana Irène Jacinta Joan Kalpana Kateryna Keiko
  Leocadia Lorraine Lubna Mabel Maeve Marisol Marguerite Meiling Nadezhda Ngozi Noémie Odalys
  Ottilie Parvati Philippa Rosalind Rukmini Saoirse Shirin Solveig Tamsin Thandeka Ursula
  Verónica Winifred Xiomara Yetunde Zofia
`);

export const mensNames = listed(`
  Abdoulaye Alasdair Ambrose Amadou Anatole Anselm Archibald Arvid Balthazar Bartholomew Benício
  Björn Casimir Ciarán Clement Cornelius Dashiell Demetrios Desmond Efraín Emeka Enzo Everett
  Farid Ferdinand Florian Gaspar Gideon Giacomo Godfrey Hamish Haruto Hyeon Ignacio Isidore
  Jafar Joaquín Jürgen Kofi Kwabena Lazarus Leopold Ludvig Malachi Matthias Minh Mordecai
  Nikolaos Obadiah Octavio Olufemi Percival Prakash Quentin Raghav Reginald Rupert Séamus Sigurd
  Tadeusz Thelonius Tomás Uchenna Valentín Wendell Xavier Yusuf Zebedee
`);
