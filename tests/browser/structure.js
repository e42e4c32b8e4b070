// What is wrong with the structure of a page, as sentences. Contrast: Web Content Accessibility Guidelines 2.2,
// success criterion 1.4.3 (4.5 for text, 3 for large text) with the relative luminance of sRGB; the figures and
// the formula are remembered, not read again.
() => {
  const wrong = [];
  const all = (what, within = document) => Array.from(within.querySelectorAll(what));
  const seen = (one) => one.checkVisibility({ checkVisibilityCSS: true });
  const line = (one) => one.outerHTML.slice(0, 120);
  if (document.documentElement.lang !== "en") wrong.push("no language");
  if (!document.title.trim()) wrong.push("no title");
  for (const [what, count] of [["h1", 1], ["main", 1], ["body > header", 1]])
    if (all(what).length !== count) wrong.push(`${all(what).length} of ${what}`);
  // The cautions stand in the foot of every page on which somebody works.
  if (document.querySelector("nav") && all("body > footer").length !== 1) wrong.push("no foot");
  let level = 0;
  for (const heading of all("h1, h2, h3, h4")) {
    const own = Number(heading.tagName[1]);
    if (own > level + 1) wrong.push(`heading skips a level: ${line(heading)}`);
    if (!heading.textContent.trim()) wrong.push(`empty heading: ${line(heading)}`);
    level = own;
  }
  const ids = all("[id]").map((one) => one.id);
  for (const id of new Set(ids.filter((id, at) => ids.indexOf(id) !== at))) wrong.push(`id twice: ${id}`);
  for (const one of all("[aria-labelledby], [aria-describedby]"))
    for (const name of ["aria-labelledby", "aria-describedby"])
      for (const id of (one.getAttribute(name) || "").split(" ").filter(Boolean))
        if (!document.getElementById(id)) wrong.push(`${name} leads nowhere: ${line(one)}`);
  for (const input of all("input:not([type=hidden]), select, textarea")) {
    const name = input.getAttribute("aria-label") || Array.from(input.labels || []).map((l) => l.textContent).join("");
    if (!name.trim()) wrong.push(`no label: ${line(input)}`);
  }
  for (const one of all("button, a[href], summary"))
    if (!(one.getAttribute("aria-label") || one.textContent).trim()) wrong.push(`no name: ${line(one)}`);
  for (const image of all("img:not([alt])")) wrong.push(`no alternative: ${line(image)}`);
  for (const drawing of all("svg").filter((one) => !one.closest("[aria-hidden=true]")))
    if (!drawing.getAttribute("aria-label") && !drawing.querySelector("title") && !drawing.getAttribute("aria-labelledby"))
      wrong.push(`drawing without a name: ${line(drawing)}`);
  for (const one of all("[tabindex]")) if (Number(one.getAttribute("tabindex")) > 0) wrong.push(`tab order: ${line(one)}`);
  for (const table of all("table")) if (!table.querySelector("th")) wrong.push(`table without heads: ${line(table)}`);
  for (const one of all("[style]")) wrong.push(`style in line: ${line(one)}`);

  const rgb = (text) => (text.match(/[\d.]+/g) || []).map(Number);
  const light = ([r, g, b]) => [r, g, b].map((c) => c / 255).map((c) => c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4)
    .reduce((sum, c, at) => sum + c * [0.2126, 0.7152, 0.0722][at], 0);
  const behind = (one) => {
    for (let at = one; at; at = at.parentElement) {
      const colour = rgb(getComputedStyle(at).backgroundColor);
      if (colour.length === 3 || colour[3] > 0.99) return colour;
    }
    return [255, 255, 255];
  };
  const texts = all("body *").filter((one) => !one.closest("svg") && seen(one) && Array.from(one.childNodes)
    .some((node) => node.nodeType === 3 && node.textContent.trim()));
  for (const one of texts) {
    const style = getComputedStyle(one), [a, b] = [light(rgb(style.color)), light(behind(one))];
    const ratio = (Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05);
    const size = parseFloat(style.fontSize), large = size >= 24 || (size >= 18.66 && Number(style.fontWeight) >= 700);
    if (ratio < (large ? 3 : 4.5)) wrong.push(`contrast ${ratio.toFixed(2)}: ${line(one)}`);
  }
  return wrong;
}
