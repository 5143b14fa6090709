//! Reading rule files: what is shipped, and what is said of mistakes.

use haloshed::rules::check::read_rules;
use haloshed::rules::error::line_column;
use haloshed::rules::library::{RuleSet, SHIPPED};

/// The mistakes of a file: `line:column: sentence | what is underlined | hint`.
fn mistakes(text: &str) -> Vec<String> {
    let Err(error) = read_rules("test.rules", text) else { return Vec::new() };
    let shown = error.errors.iter().map(|e| {
        let (line, column) = line_column(text, e.span.start);
        let hint = e.hint.as_ref().map_or_else(|| "no hint".to_owned(), Clone::clone);
        format!("{line}:{column}: {e} | {} | {hint}", &text[e.span.clone()])
    });
    shown.collect()
}

#[test]
fn shipped_files_are_read() {
    for (file, text) in SHIPPED {
        if let Err(error) = read_rules(file, text) {
            panic!("{error}\n{:#?}", error.errors);
        }
        assert_eq!(mistakes(text), Vec::<String>::new());
    }
    let names: Vec<String> =
        RuleSet::shipped().rules().iter().map(|r| format!("{} {}", r.name, r.on_by_default)).collect();
    println!("{names:?}");
    assert_eq!(names.len(), 13);
}
