// Reads a report as JSON on standard input, prints one JSON object: file name to content, an SVG and
// the CSV of its data for every figure.
import fs from "node:fs";
import path from "node:path";
import url from "node:url";
import vm from "node:vm";

const folder = path.dirname(url.fileURLToPath(import.meta.url));
for (const script of ["node_modules/vega/build/vega.min.js", "node_modules/vega-lite/build/vega-lite.min.js",
  "fields.js", "data.js", "figures.js"])
  vm.runInThisContext(fs.readFileSync(path.join(folder, script), "utf8"), { filename: script });

// Widths of sans-serif letters in thousandths of the size: there is no canvas to measure with.
const widths = (() => {
  const table = new Map();
  const set = (letters, width) => { for (const letter of letters) table.set(letter, width); };
  set("ijl'|", 222); set(" .,:;!/ft[]I", 278); set("()r-°", 333); set("ckszvxyJ", 500);
  set("abdeghnopqu0123456789−+=", 556); set("FTZL", 611); set("ABEKPSVXY", 667); set("CDHNRUw", 722);
  set("GOQ", 778); set("mM@", 833); set("W", 944); set("²³⁻¹", 333);
  return table;
})();
vega.textMetrics.width = (item, text) => {
  let sum = 0;
  for (const letter of String(text ?? "")) sum += widths.get(letter) ?? 560;
  return (sum / 1000) * vega.textMetrics.height(item) * 1.12;
};

const report = gapwright.unpack(JSON.parse(fs.readFileSync(0, "utf8")));
const files = {};
for (const figure of gapwright.allFigures(report, { width: 820, theme: "light" })) {
  const view = new vega.View(vega.parse(gapwright.compiled(figure, "light")), { renderer: "none" });
  await view.runAsync();
  files[`${figure.id}.svg`] = await view.toSVG();
  view.finalize();
  for (const [name, rows] of Object.entries(figure.tables))
    files[`${figure.id}${name && "-"}${name}.csv`] = gapwright.csv(rows);
}
process.stdout.write(JSON.stringify(files));
