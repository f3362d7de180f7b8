//! The floor's coefficient moments as seen while designing: all panels as given, or one of them swapped for
//! another thickness.

use super::fixed::Fixed;
use crate::criteria::Criteria;
use crate::floor::{Floor, PanelId};

/// The designed panels' moments, with at most one panel swapped.
#[derive(Clone, Copy)]
pub(crate) struct View<'a> {
    pub(crate) floor: &'a Floor,
    pub(crate) criteria: &'a Criteria,
    pub(crate) fixed: &'a [Option<Fixed>],
    pub(crate) swap: Option<(PanelId, &'a Fixed)>,
}

impl<'a> View<'a> {
    /// A panel's moments; none where it is not designed.
    pub(crate) fn fixed(&self, id: PanelId) -> Option<&'a Fixed> {
        match self.swap {
            Some((swapped, fixed)) if swapped == id => Some(fixed),
            _ => self.fixed[id.0].as_ref(),
        }
    }
}
