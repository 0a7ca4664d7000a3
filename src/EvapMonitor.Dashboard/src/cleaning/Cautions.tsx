/** What stands above the button that logs a cleaning. */
export function Cautions() {
  return (
    <section class="cautions" aria-labelledby="cautions">
      <h3 id="cautions">Before anyone cleans</h3>
      <ul>
        <li>Caustic first, then acid, with a full rinse between: together they react violently.</li>
        <li>Acid can set free hydrogen: vent, and keep every ignition source away. On sulphide scale it sets free hydrogen sulphide, on carbonate scale carbon dioxide; with hypochlorite, chlorine.</li>
        <li>Caustic on aluminium or zinc sets free hydrogen. Pour acid into water, never water into acid.</li>
        <li>Isolate, vent and cool before opening. Enter a vessel only with a permit, a gas test and an attendant.</li>
      </ul>
      <p>This page writes a log. It starts no cleaning and certifies none; the site's procedures, local codes and licensed practice come first.</p>
    </section>
  );
}
