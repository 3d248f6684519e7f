import type { ForceRequestInput } from '../../schemas/force.ts';

/** Lines to paste into a notebook or a shell that fetch the same curve. The token stays in the reader's environment. */

export interface Snippet {
	language: 'Python' | 'Shell';
	text: string;
}

const TOKEN = 'HAIRSBREADTH_TOKEN';

const inPython = (text: string) => text.replaceAll('\\', '\\\\').replaceAll("'''", "\\'\\'\\'");
const inShell = (text: string) => text.replaceAll("'", `'\\''`);

/** @param origin scheme and host of this installation */
export function curveSnippets(origin: string, request: ForceRequestInput): Snippet[] {
	const body = JSON.stringify(request, null, 1);
	return [
		{
			language: 'Python',
			text: `import json, os, urllib.request

request = urllib.request.Request(
    "${origin}/api/v1/forces",
    data='''${inPython(body)}'''.encode(),
    headers={"content-type": "application/json", "authorization": "Bearer " + os.environ["${TOKEN}"]},
)
answer = json.load(urllib.request.urlopen(request))
separation_nm = [point["separationNm"] for point in answer["points"]]
pressure_pa = [point["pressurePa"] for point in answer["points"]]
bound = [point["errorBound"]["pressure"] for point in answer["points"]]
print(answer["inputChecksum"], len(pressure_pa))
`
		},
		{
			language: 'Shell',
			text: `curl --silent --fail-with-body "${origin}/api/v1/forces" \\
  --header "content-type: application/json" --header "authorization: Bearer $${TOKEN}" \\
  --data '${inShell(JSON.stringify(request))}'
`
		}
	];
}

export function recordSnippets(origin: string, checksum: string): Snippet[] {
	const address = `${origin}/api/v1/records/${checksum}`;
	return [
		{
			language: 'Python',
			text: `import json, os, urllib.request

request = urllib.request.Request(
    "${address}",
    headers={"authorization": "Bearer " + os.environ["${TOKEN}"]},
)
record = json.load(urllib.request.urlopen(request))["record"]["content"]
for choice in record["choices"]:
    separation_nm = [point["separationNm"] for point in choice["points"]]
    pressure_pa = [point["pressurePa"] for point in choice["points"]]
    print(choice["letter"], choice["name"], len(pressure_pa))
`
		},
		{
			language: 'Shell',
			text: `curl --silent --fail-with-body "${address}" --header "authorization: Bearer $${TOKEN}"\n`
		}
	];
}
