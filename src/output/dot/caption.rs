//! The caption: what the figure shows, under which conditions, and how sure.

use super::text::markup;
use crate::output::decimals::volt_sd_text;
use crate::output::record::Network;
use crate::output::table::title;

/// The caption as markup, lines flush left.
pub(super) fn caption(network: &Network) -> String {
    let header = &network.header;
    let parents: Vec<String> = header.parents.iter().filter_map(|&id| network.compound(id)).map(title).collect();
    let extent = if header.complete { "" } else { " INCOMPLETE: a limit was reached; \"...\" marks where it goes on." };
    let mut lines = vec![
        format!("Reductive network of {}.{extent}", parents.join("; ")),
        format!("{}; organics at equal activity.", header.conditions.text(network.halogen_elements())),
        format!("On the arrows: rule and E' in volts against SHE{}.", uncertainty(network)),
    ];
    if network.steps.iter().any(|step| step.e_volt.is_none()) {
        lines.push(
            "In parentheses: dG' in kJ/mol where no electron is transferred, ? where there is no estimate.".into(),
        );
    }
    let markup = lines.iter().map(|line| format!("{}<br align=\"left\"/>", markup(line)));
    markup.collect()
}

/// The range of standard uncertainties.
fn uncertainty(network: &Network) -> String {
    let mut sds: Vec<f64> = network.steps.iter().filter_map(|step| step.e_sd_volt).collect();
    sds.sort_by(f64::total_cmp);
    match (sds.first(), sds.last()) {
        (Some(&low), Some(&high)) => match (volt_sd_text(low), volt_sd_text(high)) {
            (low, high) if low == high => format!(", standard uncertainty {low}"),
            (low, high) => format!(", standard uncertainty {low} to {high}"),
        },
        _ => String::new(),
    }
}
