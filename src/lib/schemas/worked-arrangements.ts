/** Arrangements to begin with: each shows something that the engine can state, as the address of a study. */

export interface WorkedArrangement {
	name: string;
	/** What there is to see. */
	shows: string;
	query: `?${string}`;
}

const gold = 'gold-lorentz-drude@1.0';
const silica = 'silica-two-oscillators@1.0';
const water = 'water-parsegian@1.0';
const sapphire = 'sapphire-ordinary-two-oscillators@1.0';

export const WORKED_ARRANGEMENTS: readonly WorkedArrangement[] = [
	{
		name: 'Gold against silica in bromobenzene',
		shows: 'repulsion, and two rival data sets that disagree on where it begins',
		query: `?left=${gold}&medium=bromobenzene-debye-uv@1.0&right=${silica}&choice=One ultraviolet term&choice=Seven oscillators;medium:bromobenzene-seven-oscillators@1.0`
	},
	{
		name: 'Gold against gold in vacuum',
		shows: 'the static term by Drude and by plasma, apart by tens of per cent beyond a micrometre',
		query: `?left=gold-drude@1.0&medium=vacuum@1.0&right=gold-drude@1.0&choice=Drude;left:!drude;right:!drude&choice=Plasma;left:!plasma;right:!plasma&from=100&to=10000&at=1000`
	},
	{
		name: 'Silica against silica in salt water',
		shows: 'ions that screen the static term: none, a hundredth of a mole, and off',
		query: `?left=${silica}&medium=${water}&right=${silica}&salt=0.01,1&choice=Screened&choice=No ions;debye:none&choice=Static term off;debye:off&from=1&to=300&at=20`
	},
	{
		name: 'A gold film on silica',
		shows: 'a layer: thin gold is not thick gold',
		query: `?left=${gold}:5nm,${silica}&medium=vacuum@1.0&right=${gold}&choice=Five nanometres&from=2&to=2000&at=50`
	},
	{
		name: 'Rough gold against a gold sphere',
		shows: 'roughness averaged over both surfaces, and a force with the error of the proximity approximation',
		query: `?left=${gold}&medium=vacuum@1.0&right=${gold}&shape=spherePlate:50&rough=1,1&choice=Rough&from=10&to=1000&at=100`
	},
	{
		name: 'Sapphire with its axis along the normal',
		shows: 'a uniaxial body, with both of its permittivities',
		query: `?left=${sapphire}*sapphire-extraordinary-two-oscillators@1.0&medium=${water}&right=${silica}&choice=Axis along the normal&from=1&to=1000&at=10`
	},
	{
		name: 'Gold against silica with data uncertain by five per cent',
		shows: 'what an uncertainty of the data does to the number, apart from the numerical bound',
		query: `?left=${gold}&medium=vacuum@1.0&right=${silica}&uncertainty=0.05&choice=Five per cent&from=5&to=1000&at=50`
	},
	{
		name: 'Water that follows the temperature',
		shows: 'a medium whose permittivity belongs to the temperature of the arrangement',
		query: `?left=${silica}&medium=water-temperature@1.0&right=${silica}&T=330&choice=At 330 K&choice=Fixed at 293 K;medium:${water}&from=1&to=1000&at=10`
	}
];
