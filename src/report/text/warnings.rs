//! What a reviewer would raise.

use crate::report::page::Page;

/// The warnings, numbered so that they can be referred to; nothing where there are none.
pub(in crate::report) fn warnings(page: &mut Page<'_>, warnings: &[String]) {
    if warnings.is_empty() {
        return;
    }
    page.blank();
    page.alert(0, "Warnings");
    let widest = warnings.len().to_string().len();
    for (index, warning) in warnings.iter().enumerate() {
        page.item(&format!("  {:>widest$}. ", index + 1), widest + 4, warning);
    }
}
