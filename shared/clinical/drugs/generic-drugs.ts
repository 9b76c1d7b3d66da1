import type { RateActingDrug } from '../prescribing/request';
import type { DrugFlag, GenericDrug } from './drug';

// Compiled by us from memory of common U.S. generic names: a help in typing, no reference. What a label or a pharmacist says prevails,
// and a drug that is not listed is entered by its name with its class chosen by hand.

export const genericDrugsSource =
  'Our own list of common generic names, from memory; the label and the pharmacist prevail.';

interface Group {
  readonly drugClass: string;
  readonly names: readonly string[];
  readonly rateActing?: RateActingDrug;
  readonly flags?: readonly DrugFlag[];
}

const groups: readonly Group[] = [
  {
    drugClass: 'Beta blocker',
    rateActing: 'beta-blocker',
    names: [
      'Acebutolol',
      'Atenolol',
      'Betaxolol',
      'Bisoprolol: fumarate',
      'Carvedilol: phosphate',
      'Labetalol',
      'Metoprolol: succinate, tartrate',
      'Nadolol',
      'Nebivolol',
      'Pindolol',
      'Propranolol',
      'Timolol',
    ],
  },
  { drugClass: 'If-channel inhibitor', rateActing: 'ivabradine', names: ['Ivabradine'] },
  {
    drugClass: 'Calcium-channel blocker that slows the rate',
    rateActing: 'diltiazem-verapamil',
    names: ['Diltiazem', 'Verapamil'],
  },
  { drugClass: 'Cardiac glycoside', rateActing: 'digoxin', names: ['Digoxin'] },
  {
    drugClass: 'Antiarrhythmic that slows the rate',
    rateActing: 'amiodarone-sotalol',
    names: ['Amiodarone', 'Dronedarone', 'Sotalol'],
  },
  {
    drugClass: 'Thyroid hormone',
    rateActing: 'thyroid-hormone',
    names: ['Levothyroxine: sodium', 'Liothyronine'],
  },
  {
    drugClass: 'Central alpha agonist',
    rateActing: 'other',
    names: ['Clonidine', 'Guanfacine', 'Methyldopa'],
  },
  {
    drugClass: 'Bronchodilator, beta agonist',
    rateActing: 'other',
    names: ['Albuterol', 'Formoterol', 'Levalbuterol', 'Salmeterol'],
  },
  {
    drugClass: 'Stimulant',
    rateActing: 'other',
    names: ['Amphetamine', 'Atomoxetine', 'Lisdexamfetamine', 'Methylphenidate', 'Phentermine'],
  },
  {
    drugClass: 'Antiarrhythmic',
    rateActing: 'other',
    names: ['Disopyramide', 'Dofetilide', 'Flecainide', 'Mexiletine', 'Propafenone', 'Quinidine'],
  },
  {
    drugClass: 'Cholinesterase inhibitor',
    rateActing: 'other',
    names: ['Donepezil', 'Galantamine', 'Pyridostigmine', 'Rivastigmine'],
  },
  {
    drugClass: 'Tricyclic antidepressant',
    rateActing: 'other',
    names: ['Amitriptyline', 'Nortriptyline'],
  },
  { drugClass: 'Alpha agonist', rateActing: 'other', names: ['Midodrine', 'Pseudoephedrine'] },
  {
    drugClass: 'Anticoagulant',
    flags: ['anticoagulant'],
    names: ['Apixaban', 'Dabigatran', 'Edoxaban', 'Enoxaparin', 'Rivaroxaban', 'Warfarin: sodium'],
  },
  {
    drugClass: 'Nitrate',
    flags: ['nitrate'],
    names: ['Isosorbide: dinitrate, mononitrate', 'Nitroglycerin'],
  },
  {
    drugClass: 'Vasodilator with nitrate',
    flags: ['nitrate'],
    names: ['Hydralazine with isosorbide dinitrate'],
  },
  {
    drugClass: 'Insulin',
    flags: ['glucose-lowering'],
    names: [
      'Insulin aspart',
      'Insulin degludec',
      'Insulin detemir',
      'Insulin glargine',
      'Insulin glulisine',
      'Insulin lispro',
      'Insulin NPH',
      'Insulin regular',
    ],
  },
  {
    drugClass: 'Insulin secretagogue',
    flags: ['glucose-lowering'],
    names: ['Glimepiride', 'Glipizide', 'Glyburide', 'Nateglinide', 'Repaglinide'],
  },
  {
    drugClass: 'Other diabetes drug',
    names: [
      'Canagliflozin',
      'Dapagliflozin',
      'Dulaglutide',
      'Empagliflozin',
      'Liraglutide',
      'Metformin',
      'Pioglitazone',
      'Semaglutide',
      'Sitagliptin',
      'Tirzepatide',
    ],
  },
  {
    drugClass: 'Antiplatelet',
    names: ['Aspirin', 'Clopidogrel', 'Dipyridamole', 'Prasugrel', 'Ticagrelor'],
  },
  {
    drugClass: 'Statin',
    names: [
      'Atorvastatin',
      'Fluvastatin',
      'Lovastatin',
      'Pitavastatin',
      'Pravastatin',
      'Rosuvastatin',
      'Simvastatin',
    ],
  },
  {
    drugClass: 'Other lipid drug',
    names: [
      'Alirocumab',
      'Bempedoic acid',
      'Evolocumab',
      'Ezetimibe',
      'Fenofibrate',
      'Gemfibrozil',
      'Icosapent ethyl',
      'Inclisiran',
    ],
  },
  {
    drugClass: 'ACE inhibitor',
    names: [
      'Benazepril',
      'Captopril',
      'Enalapril',
      'Fosinopril',
      'Lisinopril',
      'Perindopril',
      'Quinapril',
      'Ramipril',
      'Trandolapril',
    ],
  },
  {
    drugClass: 'Angiotensin receptor blocker',
    names: [
      'Azilsartan',
      'Candesartan',
      'Irbesartan',
      'Losartan',
      'Olmesartan',
      'Sacubitril with valsartan',
      'Telmisartan',
      'Valsartan',
    ],
  },
  {
    drugClass: 'Calcium-channel blocker',
    names: ['Amlodipine', 'Felodipine', 'Isradipine', 'Nicardipine', 'Nifedipine'],
  },
  {
    drugClass: 'Diuretic',
    names: [
      'Amiloride',
      'Bumetanide',
      'Chlorthalidone',
      'Eplerenone',
      'Finerenone',
      'Furosemide',
      'Hydrochlorothiazide',
      'Indapamide',
      'Metolazone',
      'Spironolactone',
      'Torsemide',
      'Triamterene',
    ],
  },
  {
    drugClass: 'Vasodilator or alpha blocker',
    names: ['Doxazosin', 'Hydralazine', 'Minoxidil', 'Prazosin', 'Tamsulosin', 'Terazosin'],
  },
  { drugClass: 'Antianginal', names: ['Ranolazine'] },
  {
    drugClass: 'Heart failure, other',
    names: ['Mavacamten', 'Omecamtiv mecarbil', 'Tafamidis', 'Vericiguat'],
  },
  {
    drugClass: 'Pulmonary hypertension',
    names: ['Ambrisentan', 'Bosentan', 'Macitentan', 'Riociguat', 'Sildenafil', 'Tadalafil'],
  },
  {
    drugClass: 'Immunosuppressant',
    names: [
      'Azathioprine',
      'Cyclosporine',
      'Everolimus',
      'Mycophenolate',
      'Prednisone',
      'Sirolimus',
      'Tacrolimus',
    ],
  },
  {
    drugClass: 'Antidepressant',
    names: [
      'Bupropion',
      'Citalopram',
      'Duloxetine',
      'Escitalopram',
      'Fluoxetine',
      'Mirtazapine',
      'Paroxetine',
      'Sertraline',
      'Trazodone',
      'Venlafaxine',
    ],
  },
  {
    drugClass: 'Lung, other',
    names: ['Budesonide', 'Fluticasone', 'Montelukast', 'Tiotropium', 'Umeclidinium'],
  },
  {
    drugClass: 'Stomach, gout, pain and other',
    names: [
      'Acetaminophen',
      'Alendronate',
      'Allopurinol',
      'Celecoxib',
      'Colchicine',
      'Famotidine',
      'Finasteride',
      'Gabapentin',
      'Ibuprofen',
      'Methimazole',
      'Naproxen',
      'Omeprazole',
      'Pantoprazole',
      'Potassium chloride',
      'Pregabalin',
      'Varenicline',
    ],
  },
];

/** `Name` or `Name: salt, salt`. */
function drugOf(entry: string, { drugClass, rateActing, flags = [] }: Group): GenericDrug {
  const [name = '', salts = ''] = entry.split(': ');
  return {
    name,
    drugClass,
    rateActing: rateActing ?? null,
    flags,
    salts: salts === '' ? [] : salts.split(', '),
  };
}

/** Common generic names in the order of the alphabet. @see genericDrugsSource */
const genericDrugs: readonly GenericDrug[] = groups
  .flatMap((group) => group.names.map((entry) => drugOf(entry, group)))
  .sort((a, b) => (a.name < b.name ? -1 : 1));

/** The listed drug of a name, whatever its capitals; also when its salt follows. Undefined: not listed. */
export function genericDrugOf(typed: string): GenericDrug | undefined {
  const name = typed.trim().toLowerCase();
  return genericDrugs.find((drug) => {
    const generic = drug.name.toLowerCase();
    return name === generic || drug.salts.some((salt) => name === `${generic} ${salt}`);
  });
}

/** The names that begin with what is typed, then those that contain it; at most `count`. */
export function suggestDrugs(typed: string, count: number): GenericDrug[] {
  const text = typed.trim().toLowerCase();
  if (text === '') return [];
  const at = ({ name }: GenericDrug): number => name.toLowerCase().indexOf(text);
  const found = genericDrugs.filter((drug) => at(drug) >= 0);
  return [...found.filter((drug) => at(drug) === 0), ...found.filter((drug) => at(drug) > 0)].slice(
    0,
    count,
  );
}
