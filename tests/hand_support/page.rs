//! Tables and numbers of a Markdown page.

/// A table with the words above it.
#[derive(Clone, Debug)]
pub struct Table {
    pub section: String,
    pub caption: String,
    pub head: Vec<String>,
    pub rows: Vec<Vec<String>>,
}

impl Table {
    /// The cells of a column below its head.
    pub fn cell<'r>(&self, row: &'r [String], head: &str) -> &'r str {
        let at = self.head.iter().position(|h| h == head).unwrap_or_else(|| panic!("no column {head} in {self:?}"));
        &row[at]
    }
}

/// Every table of a page, and every other line with its section.
pub fn read(page: &str) -> (Vec<Table>, Vec<(String, String)>) {
    let (mut tables, mut words) = (Vec::<Table>::new(), Vec::new());
    let (mut section, mut caption, mut inside) = (String::new(), String::new(), false);
    for line in page.lines() {
        if let Some(title) = line.strip_prefix("## ") {
            title.split_once(". ").map_or(title, |(_, words)| words).clone_into(&mut section);
        } else if let Some(cells) = line.strip_prefix("| ").and_then(|l| l.strip_suffix('|')) {
            let cells = cells.replace("\\|", "\u{0}");
            let cells: Vec<String> =
                cells.split('|').map(|c| c.trim().trim_matches('`').replace('\u{0}', "|")).collect();
            if !inside {
                tables.push(Table { section: section.clone(), caption: caption.clone(), head: cells, rows: vec![] });
            } else if !cells.iter().all(|c| c.chars().all(|c| c == '-' || c == ':') && !c.is_empty()) {
                tables.last_mut().expect("a table").rows.push(cells);
            }
            inside = true;
            continue;
        } else if let Some(title) = line.strip_prefix("**").and_then(|l| l.strip_suffix("**")) {
            title.clone_into(&mut caption);
        } else if !line.trim().is_empty() {
            words.push((section.clone(), line.to_owned()));
        }
        inside = false;
    }
    (tables, words)
}

/// Every number of a text as it stands there: digits that do not belong to a word such as `k_1` or `G3`.
pub fn numbers(text: &str) -> Vec<String> {
    let letters: Vec<char> = text.replace('−', "-").chars().collect();
    let (mut found, mut at) = (Vec::new(), 0);
    while at < letters.len() {
        let before = if at == 0 { ' ' } else { letters[at - 1] };
        if !letters[at].is_ascii_digit() || before.is_alphabetic() || before == '_' || before == '.' {
            // A word with digits in it is left out as a whole.
            let word = letters[at].is_alphanumeric() && (before.is_alphabetic() || before == '_');
            at += 1;
            while word && at < letters.len() && (letters[at].is_alphanumeric() || letters[at] == '_') {
                at += 1;
            }
            continue;
        }
        let from = at;
        while at < letters.len() && (letters[at].is_ascii_digit() || letters[at] == '.') {
            at += 1;
        }
        if at + 1 < letters.len() && letters[at] == 'e' && (letters[at + 1] == '-' || letters[at + 1].is_ascii_digit())
        {
            at += 2;
            while at < letters.len() && letters[at].is_ascii_digit() {
                at += 1;
            }
        }
        let word: String = letters[from..at].iter().collect();
        found.push(word.trim_end_matches('.').to_owned());
    }
    found
}

/// Whether a printed number is a value rounded to the digits it is printed with.
pub fn is_printed(printed: &str, value: f64) -> bool {
    let shown: f64 = printed.parse().unwrap_or(f64::NAN);
    let (mantissa, exponent) = printed.split_once('e').unwrap_or((printed, "0"));
    let decimals = mantissa.split_once('.').map_or(0, |(_, decimals)| decimals.len());
    let unit = 10_f64.powi(exponent.parse::<i32>().unwrap_or(0) - i32::try_from(decimals).unwrap_or(0));
    // Half a unit of the last digit, and what the stepping in time is off by; 0 stands for what is below 1e-8.
    let slack = if printed == "0" { 2e-8 } else { 0.5 * unit };
    (shown - value).abs() <= slack + 2e-8 * value.abs().min(1.0) + 1e-9 * value.abs()
}

#[test]
fn numbers_in_words_are_left_out() {
    assert_eq!(
        numbers("k_1 = 2 × 0.08 × √(100 × 60000.0), G3, r_1,2, e^(−1.5 τ), 1.5e-7 m"),
        ["2", "0.08", "100", "60000.0", "2", "1.5", "1.5e-7"]
    );
}

#[test]
fn the_last_digit_must_be_right() {
    assert!(is_printed("4.80", 4.804_9) && !is_printed("4.80", 4.806));
    assert!(is_printed("0.123457", 0.123_456_8) && !is_printed("0.123457", 0.123_456_4));
}
