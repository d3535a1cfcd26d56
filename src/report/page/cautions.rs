//! What stands under every report.

use maud::{Markup, html};

/// The cautions.
pub fn cautions() -> Markup {
    html! {
        footer aria-labelledby="cautions" {
            h2 id="cautions" { "Cautions" }
            p { "This is a check on instruments, not a means of navigation, and it is not type-approved." }
            ul {
                li { "The official almanac, the chart's own notes on variation and local disturbance, the adjuster's card, the maker's manual, the limits of flag and company, and the master come first." }
                li { "A compass is adjusted by a qualified adjuster. A table of observed deviations is not an adjuster's certificate." }
                li { "Never look at the sun without the azimuth circle's shades." }
            }
        }
    }
}
