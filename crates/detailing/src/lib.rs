//! MAIN PATH of detailing: [`detail`], from steel required to bars on site.
//!
//! ```text
//! FloorDesign ─▶ sets of bars on plan (bottom, over supports, distribution, edges, corners, openings)
//!             ─▶ runs of equal bars, cut at openings, in stock lengths
//!             ─▶ marks, one for each bar of the floor ─▶ quantities
//! ```
//! Extents come from the design; here they become places, dimensions in whole 5 mm and lengths in whole 25 mm. Nothing is
//! added twice: callouts, bending schedule and quantities are views of one list.

pub mod bending;
mod bottom;
pub mod callouts;
mod context;
mod corners;
mod distribution;
mod drafts;
mod edges;
pub mod inputs;
mod marks;
pub mod model;
pub mod notes;
mod openings;
mod placed;
pub mod quantities;
pub mod reconcile;
pub mod reissue;
mod slab;
mod supports;
pub mod zones;

use design_engine::criteria::Criteria;
use design_engine::floor::{Floor, PanelId};
use design_engine::query::Query;
use design_engine::result::FloorDesign;
use rayon::prelude::*;

pub use marks::BarKey;

use context::{Context, PanelContext};
use drafts::SetDraft;
use model::BarSchedule;

/// Every bar of a designed floor, with marks and quantities. Panels that are not designed have none.
#[must_use]
pub fn detail(floor: &Floor, design: &FloorDesign, criteria: &Criteria) -> BarSchedule {
    let context = Context { floor, design, criteria };
    let of_panels: Vec<(Vec<SetDraft>, Vec<Query>)> = (0..floor.panels.len())
        .into_par_iter()
        .filter_map(|index| context.panel(PanelId(index)))
        .map(|panel| panel_sets(&panel))
        .collect();
    let mut drafts = Vec::new();
    let mut queries = Vec::new();
    for (sets, said) in of_panels {
        drafts.extend(sets);
        queries.extend(said);
    }
    drafts.extend(supports::sets(&context));
    let (sets, bars) = marks::mark(drafts);
    let quantities = quantities::quantities(floor, &bars, &sets);
    BarSchedule { bars, sets, quantities, queries }
}

fn panel_sets(panel: &PanelContext<'_>) -> (Vec<SetDraft>, Vec<Query>) {
    let mut queries = Vec::new();
    let mut sets = bottom::sets(panel);
    sets.extend(distribution::sets(panel));
    sets.extend(edges::sets(panel, &mut queries));
    sets.extend(corners::sets(panel));
    sets.extend(openings::sets(panel));
    (sets, queries)
}
