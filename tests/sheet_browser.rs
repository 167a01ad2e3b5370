//! Sheets in a real browser without a window: what it complains of, contrast and width as it computes them, and the pages
//! that it prints. Needs the programs `chromium`, `pdftotext` and `pdfinfo`.
#![allow(clippy::expect_used, clippy::panic, clippy::unwrap_used, reason = "a test fails by panicking")]
use std::collections::{BTreeMap, BTreeSet};
use std::path::{Path, PathBuf};
use std::process::{Command, Output};

/// Longest time that a program may take, s.
const LONGEST: &str = "120";

fn program(name: &str) -> PathBuf {
    let folders = std::env::var_os("PATH").unwrap_or_default();
    let found = std::env::split_paths(&folders).map(|folder| folder.join(name)).find(|path| path.is_file());
    found.unwrap_or_else(|| {
        panic!("`{name}` is missing: install it with `sudo apt-get install chromium poppler-utils` (README, Set up)")
    })
}

fn run(name: &str, args: &[&str]) -> Output {
    let run = Command::new("timeout").arg(LONGEST).arg(program(name)).args(args).output().expect("`timeout` runs");
    assert!(run.status.success(), "{name} {args:?}: {}", String::from_utf8_lossy(&run.stderr));
    run
}

struct Page {
    folder: tempfile::TempDir,
    html: String,
}

impl Page {
    fn of(scenario: &str, args: &[&str]) -> Self {
        let folder = tempfile::tempdir().expect("a folder");
        let out = folder.path().join("sheet.html");
        let file = format!("scenarios/{scenario}.toml");
        let mut program = assert_cmd::Command::cargo_bin("underfoot").expect("the program");
        let run = program.args(["sheet", &file, "-o"]).arg(&out).args(args).output().expect("a run");
        assert!(out.exists(), "{}", String::from_utf8_lossy(&run.stderr));
        let html = std::fs::read_to_string(out).expect("a sheet");
        Self { folder, html }
    }

    /// The browser on a copy of the sheet with something added before its end.
    fn browse(&self, added: &str, args: &[&str]) -> Output {
        let copy = self.folder.path().join("copy.html");
        std::fs::write(&copy, self.html.replace("</body>", &format!("{added}</body>"))).expect("a copy");
        let profile = format!("--user-data-dir={}", self.folder.path().join("profile").display());
        let address = format!("file://{}", copy.display());
        let fixed =
            ["--headless", "--no-sandbox", "--disable-gpu", "--hide-scrollbars", "--enable-logging=stderr", &profile];
        run("chromium", &[&fixed, args, &[address.as_str()]].concat())
    }

    fn print(&self, paper: &str) -> PathBuf {
        let pdf = self.folder.path().join("sheet.pdf");
        let to = format!("--print-to-pdf={}", pdf.display());
        let added = format!("<style>@page {{ size: {paper}; }}</style><script>{MARKERS}</script>");
        complaints(&self.browse(&added, &["--no-pdf-header-footer", &to]));
        pdf
    }
}

/// What a page says on the console; nothing is what is wanted.
fn console(run: &Output) -> Vec<String> {
    let said = String::from_utf8_lossy(&run.stderr).into_owned();
    said.lines().filter(|line| line.contains("CONSOLE")).map(str::to_owned).collect()
}

fn complaints(run: &Output) {
    let said = console(run);
    assert!(said.is_empty(), "{said:#?}");
}

/// Looks at every element with words of its own: contrast against what is behind it; at the width of the page; at the
/// order of headings; at the names of figures.
const LOOK: &str = r"
const found = [];
const numbers = s => s.match(/[\d.]+/g).map(Number);
const light = c => { const [r, g, b] = c.slice(0, 3).map(v => v / 255).map(v => v <= 0.04045 ? v / 12.92 : ((v + 0.055) / 1.055) ** 2.4);
  return 0.2126 * r + 0.7152 * g + 0.0722 * b; };
const behind = e => { for (; e; e = e.parentElement) { const c = numbers(getComputedStyle(e).backgroundColor);
  if (c.length < 4 || c[3] > 0) return c; } return [255, 255, 255]; };
let looked = 0, least = 99;
for (const e of document.querySelectorAll('body *')) {
  if (e.closest('title, desc, script, style')) continue;
  if (![...e.childNodes].some(n => n.nodeType === 3 && n.textContent.trim())) continue;
  const style = getComputedStyle(e), drawn = e.namespaceURI.endsWith('svg');
  const [a, b] = [light(numbers(drawn ? style.fill : style.color)), light(behind(e))].sort((x, y) => y - x);
  const ratio = (a + 0.05) / (b + 0.05);
  looked += 1; least = Math.min(least, ratio);
  if (ratio < 4.5) found.push(`contrast ${ratio.toFixed(2)}: ${e.textContent.slice(0, 40)}`);
}
for (const svg of document.querySelectorAll('svg')) {
  const names = (svg.getAttribute('aria-labelledby') || '').split(' ').map(id => document.getElementById(id)?.textContent || '');
  if (svg.getAttribute('role') !== 'img' || names.length < 2 || names.some(n => n.length < 5)) found.push('a figure without a name');
  for (const text of svg.querySelectorAll('text')) {
    const box = text.getBBox(), view = svg.viewBox.baseVal;
    if (box.x < -1 || box.x + box.width > view.width + 1 || box.y < -1 || box.y + box.height > view.height + 1) found.push(`outside of its figure: ${text.textContent}`);
  }
}
const heads = [...document.querySelectorAll('h1, h2, h3, h4')].map(h => Number(h.tagName[1]));
if (heads[0] !== 1 || heads.filter(h => h === 1).length !== 1) found.push('not one heading of the first order');
heads.reduce((before, h) => { if (h > before + 1) found.push('a heading of an order left out'); return h; }, 0);
if (document.documentElement.scrollWidth > document.documentElement.clientWidth) found.push('wider than the window');
if (document.documentElement.lang !== 'en') found.push('no language');
const result = document.createElement('pre'); result.id = 'result';
result.textContent = `BACK ${getComputedStyle(document.body).backgroundColor} LOOKED ${looked} LEAST ${least.toFixed(2)} FIGURES ${document.querySelectorAll('svg').length} FOUND ${JSON.stringify(found)} END`;
document.body.append(result);
";

/// Marks the first and the last words of every cell, every head and every figure, so that they are found in print.
const MARKERS: &str = r"
const mark = (e, word, end) => { const s = document.createElement('span'); s.textContent = word; s.style.cssText = 'font-size:2px;white-space:nowrap';
  if (end) e.append(' ', s); else e.prepend(s, ' '); };
document.querySelectorAll('table').forEach((table, t) => {
  if (table.tHead) mark(table.tHead.rows[0].cells[0], `qhead${t}q`, false);
  [...table.tBodies[0].rows].forEach((row, r) => [...row.cells].forEach(cell => { mark(cell, `qrow${t}x${r}q`, false); mark(cell, `qrow${t}x${r}q`, true); }));
});
document.querySelectorAll('figure').forEach((figure, f) => { mark(figure, `qfig${f}q`, false); mark(figure.querySelector('figcaption'), `qfig${f}q`, true); });
";

fn between<'t>(text: &'t str, from: &str, to: &str) -> &'t str {
    let start = text.rfind(from).unwrap_or_else(|| panic!("no {from} in the page")) + from.len();
    text[start..].split(to).next().unwrap_or_default().trim()
}

fn looks_right(page: &Page, scheme: &str, back: &str, window: &str) {
    let added = format!("<script>{LOOK}</script>");
    let run = page.browse(&added, &[scheme, window, "--dump-dom"]);
    complaints(&run);
    let dom = String::from_utf8_lossy(&run.stdout);
    assert_eq!(between(&dom, "BACK ", " LOOKED"), back, "the scheme is not the one asked for");
    assert_eq!(between(&dom, "FOUND ", " END"), "[]", "{scheme} {window}");
    let looked: usize = between(&dom, "LOOKED ", " LEAST").parse().expect("a count");
    assert!(looked > 200, "only {looked} words looked at");
}

/// 1 is light and 0 is dark.
const LIGHT: (&str, &str) = ("--blink-settings=preferredColorScheme=1", "rgb(255, 255, 255)");
const DARK: (&str, &str) = ("--blink-settings=preferredColorScheme=0", "rgb(21, 24, 28)");

fn pages(pdf: &Path) -> Vec<String> {
    let run = run("pdftotext", &["-raw", pdf.to_str().expect("a name"), "-"]);
    let text = String::from_utf8_lossy(&run.stdout).into_owned();
    text.split('\u{c}').filter(|page| !page.trim().is_empty()).map(str::to_owned).collect()
}

fn prints_right(page: &Page, paper: &str, size: &str) {
    let pdf = page.print(paper);
    let info = run("pdfinfo", &[pdf.to_str().expect("a name")]);
    let info = String::from_utf8_lossy(&info.stdout).into_owned();
    assert!(info.contains(size), "{paper}: {info}");
    let mut places: BTreeMap<String, BTreeSet<usize>> = BTreeMap::new();
    let found = pages(&pdf);
    for (number, text) in found.iter().enumerate() {
        for word in text.split_whitespace().filter(|w| w.starts_with('q') && w.ends_with('q') && w.len() > 4) {
            places.entry(word.to_owned()).or_default().insert(number);
        }
        assert!(text.contains("first-pass estimate, not a design"), "{paper}, page {number}: no caution");
    }
    let rows = places.keys().filter(|word| word.starts_with("qrow")).count();
    assert!(rows > 80, "{paper}: only {rows} rows found in print");
    for (word, on) in &places {
        if word.starts_with("qhead") {
            continue;
        }
        assert_eq!(on.len(), 1, "{paper}: {word} is cut over pages {on:?}");
        let table =
            word.strip_prefix("qrow").and_then(|rest| rest.split_once('x')).map(|(table, _)| format!("qhead{table}q"));
        if let Some(heads) = table.and_then(|head| places.get(&head)) {
            assert!(on.is_subset(heads), "{paper}: the head of {word} is not on its page");
        }
    }
    let over_two = places.iter().filter(|(word, on)| word.starts_with("qhead") && on.len() > 1).count();
    assert!(over_two > 0, "{paper}: no table runs over two pages, so nothing was tried");
}

#[test]
fn a_complaint_on_the_console_is_noticed() {
    let page = Page::of("step-transfer", &[]);
    let run = page.browse("<script>console.error('a complaint')</script>", &["--dump-dom"]);
    assert_eq!(console(&run).len(), 1, "{}", String::from_utf8_lossy(&run.stderr));
}

#[test]
fn a_sheet_with_bands_reads_in_light_and_dark_and_on_a_narrow_window() {
    let page = Page::of("roof-foot-level", &[]);
    for (scheme, back) in [LIGHT, DARK] {
        looks_right(&page, scheme, back, "--window-size=1200,900");
    }
    looks_right(&page, LIGHT.0, LIGHT.1, "--window-size=700,900");
    let picture = page.folder.path().join("sheet.png");
    let to = format!("--screenshot={}", picture.display());
    complaints(&page.browse("", &["--window-size=1200,2000", &to]));
    let bytes = std::fs::read(picture).expect("a picture");
    assert!(bytes.starts_with(b"\x89PNG") && bytes.len() > 50_000, "{} bytes", bytes.len());
}

#[test]
fn a_short_sheet_with_remedies_reads_in_light_and_dark() {
    let page = Page::of("low-scaffold-short", &["--remedies", "--units", "us"]);
    for (scheme, back) in [LIGHT, DARK] {
        looks_right(&page, scheme, back, "--window-size=1200,900");
    }
}

#[test]
fn no_row_and_no_figure_is_cut_in_print() {
    let page = Page::of("roof-foot-level", &[]);
    prints_right(&page, "A4", "(A4)");
    prints_right(&page, "letter", "(letter)");
}

#[test]
fn a_swing_prints_whole_too() {
    let page = Page::of("swing-strikes-column", &["--remedies"]);
    looks_right(&page, LIGHT.0, LIGHT.1, "--window-size=1200,900");
    prints_right(&page, "A4", "(A4)");
}
