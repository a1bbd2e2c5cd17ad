//! The page in a headless browser: quiet, within its width, legible, and its controls read the tables.

use serde_json::{Value, json};

use crate::{driver::Browser, made};

/// Contrast of text with its ground that WCAG 2.2 asks for at level AA, text of normal size.
const CONTRAST: f64 = 4.5;

/// Width between the margins of A4 in the style of the page (13 mm either side), CSS pixels.
const PAPER: u32 = 695;

/// What is wider than the window, apart from what scrolls by itself.
const WIDE: &str = r"
  const width = document.documentElement.clientWidth;
  const scrolls = (element) => { for (let at = element; at; at = at.parentElement) {
    const flow = getComputedStyle(at).overflowX; if (flow === 'auto' || flow === 'scroll') return true; } return false; };
  const wide = [...document.querySelectorAll('body *')].filter((element) =>
    element.checkVisibility() && !element.closest('.skip') && !scrolls(element)
    && element.getBoundingClientRect().right > width + 1);
  return { page: document.documentElement.scrollWidth - width,
    wide: wide.map((element) => element.tagName + '.' + element.className).slice(0, 9) };";

/// Every piece of text with the contrast of its colour to the ground it stands on. Text of a figure
/// that lies on a picture is left out: it has a ground of paper drawn under it.
const FAINT: &str = r"
  const rgb = (text) => { const parts = text.match(/[\d.]+/g).map(Number); return parts.length < 4 ? [...parts, 1] : parts; };
  const light = ([r, g, b]) => { const part = (v) => { v /= 255; return v <= 0.04045 ? v / 12.92 : ((v + 0.055) / 1.055) ** 2.4; };
    return 0.2126 * part(r) + 0.7152 * part(g) + 0.0722 * part(b); };
  const ground = (element) => { for (let at = element; at; at = at.parentElement) {
    const colour = rgb(getComputedStyle(at).backgroundColor); if (colour[3] > 0) return colour; } return [255, 255, 255, 1]; };
  const found = [];
  const walker = document.createTreeWalker(document.body, NodeFilter.SHOW_TEXT);
  while (walker.nextNode()) {
    const node = walker.currentNode, element = node.parentElement;
    if (!node.textContent.trim() || !element.checkVisibility() || element.closest('script, style, title')) continue;
    const svg = element.closest('svg');
    if (svg) { const box = element.getBoundingClientRect();
      const covered = [...svg.querySelectorAll('image')].some((image) => { const other = image.getBoundingClientRect();
        return other.left < box.right && box.left < other.right && other.top < box.bottom && box.top < other.bottom; });
      if (covered) continue; }
    const style = getComputedStyle(element);
    const one = light(rgb(svg ? style.fill : style.color)), other = light(svg ? [255, 255, 255] : ground(element));
    found.push([(Math.max(one, other) + 0.05) / (Math.min(one, other) + 0.05), node.textContent.trim().slice(0, 40)]);
  }
  return found;";

#[test]
fn a_page_opens_quietly_and_its_controls_read_its_tables() {
    let made = made();
    let Some(browser) = Browser::start() else {
        return;
    };
    browser.width(1200);
    browser.open(&made.page);
    assert_eq!(browser.console(), json!([]));
    // The title is text, and nothing of it ran.
    assert_eq!(browser.run("return window.hacked ?? null"), Value::Null);
    let title = browser.run("return document.querySelector('h1').textContent");
    assert_eq!(
        title,
        json!("Lid <script>window.hacked = 1</script> & \"b\"")
    );

    let rows = browser.run(
        "return [...document.querySelectorAll('#torques tbody tr')].map((row) => [...row.cells].map((cell) => cell.textContent))",
    );
    let rows = rows.as_array().expect("rows");
    assert!(rows.len() >= 5, "{} torques", rows.len());
    let mut told = Vec::new();
    for (index, row) in rows.iter().enumerate() {
        let read = browser.run(&format!(
            "const slider = document.querySelector('#torque-slider'); slider.value = {index}; \
             slider.dispatchEvent(new Event('input')); return document.querySelector('#torque-readout').textContent"
        ));
        let read = read.as_str().expect("a text").to_owned();
        for cell in row.as_array().expect("cells") {
            let cell = cell.as_str().expect("a text");
            assert!(read.contains(cell), "{cell} is not in: {read}");
        }
        told.push(read);
    }
    told.dedup();
    assert_eq!(told.len(), rows.len(), "every torque reads differently");

    let medium = browser.run(
        "const button = [...document.querySelectorAll('[data-switch=medium] button')].find((each) => each.textContent === 'air'); \
         button.click(); const row = [...document.querySelectorAll('#media tbody tr')].find((row) => row.cells[0].textContent === 'air'); \
         return [document.querySelector('#medium-readout').textContent, row.cells[1].textContent]",
    );
    let (read, cell) = (medium[0].as_str(), medium[1].as_str());
    assert!(
        read.expect("a text").contains(cell.expect("a number")),
        "{medium}"
    );

    let shown = browser.run(
        "const shown = () => [...document.querySelectorAll('.case')].filter((each) => each.checkVisibility()).map((each) => each.dataset.case); \
         const press = (name) => [...document.querySelectorAll('[data-switch=case] button')].find((each) => each.textContent === name).click(); \
         const all = shown(); press('cold'); const cold = shown(); press('all'); return [all, cold, shown()]",
    );
    assert_eq!(shown, json!([["hot", "cold"], ["cold"], ["hot", "cold"]]));

    // The middle of a cell of the first map, by the values that the page keeps.
    let pointed = browser.run(
        "const values = JSON.parse(document.querySelector('#values').textContent); const [columns, rows] = values.size; \
         const at = values.layers[0].values.findIndex((value) => value > 0); \
         const images = [...document.querySelector('figure.plan svg').querySelectorAll('image')]; \
         const wanted = (values.window[2] - values.window[0]) / (values.window[3] - values.window[1]); \
         const map = images.find((image) => Math.abs(image.width.baseVal.value / image.height.baseVal.value / wanted - 1) < 0.02); \
         const box = map.getBoundingClientRect(); \
         const x = box.left + box.width * (at % columns + 0.5) / columns, y = box.bottom - box.height * (Math.floor(at / columns) + 0.5) / rows; \
         map.dispatchEvent(new PointerEvent('pointermove', { clientX: x, clientY: y, bubbles: true })); \
         return [document.querySelector('#pointer').textContent, String(values.layers[0].values[at]), values.layers.length]",
    );
    let expected = format!("pressure {} MPa", pointed[1].as_str().expect("a number"));
    assert!(
        pointed[0].as_str().expect("a text").contains(&expected),
        "{pointed}"
    );
    // Pressure, gap, conductance, two faces, flux.
    assert_eq!(pointed[2], json!(6));
    assert_eq!(browser.console(), json!([]));
}

#[test]
fn a_page_keeps_within_screens_and_paper() {
    let made = made();
    let Some(browser) = Browser::start() else {
        return;
    };
    browser.open(&made.page);
    for width in [360, 1200] {
        browser.width(width);
        assert_eq!(
            browser.run(WIDE),
            json!({ "page": 0, "wide": [] }),
            "{width}"
        );
    }
    browser.width(PAPER);
    browser.tell("Emulation.setEmulatedMedia", &json!({ "media": "print" }));
    assert_eq!(browser.run(WIDE), json!({ "page": 0, "wide": [] }), "paper");
    let hidden = browser.run(
        "return [...document.querySelectorAll('nav, .controls, .readout')].filter((each) => each.checkVisibility()).length",
    );
    assert_eq!(hidden, json!(0), "controls stand on paper");
    let pdf = browser.printed();
    assert!(pdf.starts_with(b"%PDF"));
    let text = String::from_utf8_lossy(&pdf);
    let pages = text.matches("/Type /Page\n").count();
    assert!((4..40).contains(&pages), "{pages} pages");
}

/// Figures that are shown: how far each must be scrolled, and the size of its smallest letters, pixels.
const LETTERS: &str = r"
  return [...document.querySelectorAll('figure svg')].filter((svg) => svg.checkVisibility()).map((svg) => {
    const sheet = svg.closest('.sheet'), scale = svg.getBoundingClientRect().width / svg.viewBox.baseVal.width;
    const sizes = [...svg.querySelectorAll('text')].map((text) => Number(text.getAttribute('font-size')) * scale);
    return [sheet.scrollWidth - sheet.clientWidth, Math.min(...sizes), svg.querySelector('title').textContent]; });";

#[test]
fn figures_fit_every_screen_with_letters_that_can_be_read() {
    let made = made();
    let Some(browser) = Browser::start() else {
        return;
    };
    browser.open(&made.page);
    let mut counts = Vec::new();
    for width in [360, 800, 820, 1200] {
        browser.width(width);
        let found = browser.run(LETTERS);
        let found = found.as_array().expect("figures");
        counts.push(found.len());
        for figure in found {
            assert_eq!(figure[0], json!(0), "{width}: {figure} must be scrolled");
            let letters = figure[1].as_f64().expect("a size");
            assert!(letters >= 9.0, "{width}: {figure}");
        }
    }
    counts.dedup();
    assert!(counts.len() == 1 && counts[0] >= 7, "{counts:?} figures");
}

#[test]
fn texts_of_a_page_stand_out_and_every_figure_is_named() {
    let made = made();
    let Some(browser) = Browser::start() else {
        return;
    };
    browser.width(1200);
    browser.open(&made.page);
    for media in ["screen", "print"] {
        browser.tell("Emulation.setEmulatedMedia", &json!({ "media": media }));
        let found = browser.run(FAINT);
        let found = found.as_array().expect("texts");
        assert!(found.len() > 300, "{} texts", found.len());
        for text in found {
            assert!(
                text[0].as_f64().expect("a ratio") >= CONTRAST,
                "{media}: {text}"
            );
        }
    }
    let nameless = browser.run(
        "return [...document.querySelectorAll('svg, img, input, button, [role=region], nav')].filter((each) => { \
           const name = each.getAttribute('aria-label') || each.querySelector(':scope > title')?.textContent || each.alt || \
             (each.labels && each.labels[0]?.textContent) || (each.tagName === 'BUTTON' && each.textContent); \
           return !name || !name.trim(); }).map((each) => each.outerHTML.slice(0, 80))",
    );
    assert_eq!(nameless, json!([]));
    let drawings = browser.run("return document.querySelectorAll('figure svg[role=img]').length");
    assert!(drawings.as_u64().expect("a number") >= 7, "{drawings}");
    let headings = browser.run(
        "return [...document.querySelectorAll('h1, h2, h3')].map((each) => Number(each.tagName[1])).every((level, at, all) => at === 0 ? level === 1 : level <= all[at - 1] + 1)",
    );
    assert_eq!(headings, json!(true), "a heading skips a level");
}
