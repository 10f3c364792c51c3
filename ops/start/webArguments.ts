/**
 * Node's arguments for the web. What a monitor's post needs is soon forgotten: with room for more young objects fewer of them are looked at
 * before they have died (`ops/bench/README.md`).
 */
export const WEB_ARGUMENTS = ['--max-semi-space-size=32', '--import', 'tsx'];
