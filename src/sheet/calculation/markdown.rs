//! The sheet as Markdown with tables.
use super::value::{Block, Cell, Column, Kind, Section, Sheet, Table};
use std::fmt::Write;

/// The sheet as Markdown. Words of the file are escaped: they make no headings, tables, links or tags.
#[must_use]
pub fn sheet_markdown(sheet: &Sheet) -> String {
    let mut page = format!("# Calculation sheet: {}\n", escape(&sheet.title));
    for (index, part) in sheet.sections.iter().enumerate() {
        section(&mut page, index + 1, part);
    }
    page
}

fn section(page: &mut String, number: usize, section: &Section) {
    let _ = write!(page, "\n## {number}. {}\n", escape(section.title));
    for block in &section.blocks {
        page.push('\n');
        match block {
            Block::Words(words) => paragraph(page, &escape(words)),
            Block::Verdict(verdict, words) => {
                let lead = format!("**{} {}**", escape(&verdict.symbol().to_string()), verdict.word().to_uppercase());
                paragraph(page, &format!("{lead}: {}", escape(words)));
            }
            Block::Part(words) => paragraph(page, &format!("### {}", escape(words))),
            Block::List(list) => list.iter().for_each(|words| paragraph(page, &format!("- {}", escape(words)))),
            Block::Table(table) => self::table(page, table),
            Block::Figure(figure) => {
                paragraph(
                    page,
                    &format!("**{}** (drawn in the HTML sheet). {}", escape(&figure.title), escape(&figure.text)),
                );
            }
            Block::Blank(lines) => {
                paragraph(page, "| to be filled in by hand | |\n| --- | --- |");
                lines.iter().for_each(|line| paragraph(page, &format!("| {line} | |")));
            }
        }
    }
}

fn paragraph(page: &mut String, words: &str) {
    page.push_str(words);
    page.push('\n');
}

fn table(page: &mut String, table: &Table) {
    paragraph(page, &format!("**{}**\n", escape(&table.caption)));
    let heads: Vec<&str> = table.columns.iter().map(|column| column.head).collect();
    paragraph(page, &format!("| {} |", heads.join(" | ")));
    let rules: Vec<&str> =
        table.columns.iter().map(|column| if column.kind == Kind::Number { "---:" } else { "---" }).collect();
    paragraph(page, &format!("| {} |", rules.join(" | ")));
    for row in &table.rows {
        let cells: Vec<String> =
            table.columns.iter().zip(&row.cells).map(|(column, cell)| self::cell(column, cell)).collect();
        paragraph(page, &format!("| {} |", cells.join(" | ")));
    }
}

fn cell(column: &Column, cell: &Cell) -> String {
    // What could be markup is never left to a code span: a name of the file may hold a backtick of its own.
    let plain = !cell.words.contains(['<', '>', '&', '`', '|']);
    if column.kind == Kind::Formula && !cell.words.is_empty() && plain {
        return format!("`{}`", cell.words);
    }
    escape(&cell.words)
}

/// Words that mean nothing to Markdown.
fn escape(words: &str) -> String {
    let mut text = String::with_capacity(words.len());
    let mut before = ' ';
    let mut rest = words.chars().peekable();
    while let Some(c) = rest.next() {
        let inside = before.is_alphanumeric() && rest.peek().is_some_and(|next| next.is_alphanumeric());
        match c {
            '<' => text.push_str("&lt;"),
            '>' => text.push_str("&gt;"),
            '&' => text.push_str("&amp;"),
            '_' if inside => text.push('_'),
            '\\' | '*' | '_' | '[' | ']' | '|' | '~' => {
                text.push('\\');
                text.push(c);
            }
            '#' if text.is_empty() => text.push_str("\\#"),
            c => text.push(c),
        }
        before = c;
    }
    text
}

#[cfg(test)]
mod tests {
    use super::escape;

    #[test]
    fn words_of_the_file_are_no_markup() {
        assert_eq!(escape("<b> & *x* | [a](b) _c_ #1"), "&lt;b&gt; &amp; \\*x\\* \\| \\[a\\](b) \\_c\\_ #1");
        assert_eq!(escape("# heading"), "\\# heading");
        assert_eq!(escape("absorber.deploy_force"), "absorber.deploy_force");
    }
}
