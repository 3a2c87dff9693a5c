const WORDS =
  `amber anvil apron aster autumn badge bakery barley basil beacon bench berry birch bridge brook button cabin candle canvas cedar chalk cherry
  cinder clover cobble copper coral cotton cradle cricket dahlia dapple denim drizzle ember fable feather fennel fiddle flint garnet ginger harbor
  hazel heather hollow indigo ivory jasper juniper kettle lantern larch linen lumber maple marble meadow mellow mitten nectar nutmeg oatmeal olive
  orchard otter paddle pebble pepper pillow plaster poplar pottery quarry quartz rafter raisin ribbon saddle saffron sandal satin shingle silver
  slate spruce stencil tallow tartan thimble thistle timber topaz tulip turnip velvet walnut willow window yarrow zephyr`
    .trim()
    .split(/\s+/)

/** Four words and two digits by chance: easy to type, long enough for the rules, different for each demo. */
export function makeDemoPassword(): string {
  const [digits = 0, ...picks] = crypto.getRandomValues(new Uint32Array(5))
  return [...picks.map((pick) => WORDS[pick % WORDS.length]), String(10 + (digits % 90))].join('-')
}
