/** Text of an example campaign, as the test server gives it. */
export async function fetchExample(name = 'three-sites'): Promise<string> {
  const response = await fetch(`/test/data/examples/${name}.json`);
  if (!response.ok) throw new Error(`test/data/examples/${name}.json: ${response.status}`);
  return response.text();
}
