//! Panels that the layout already knows to be outside what is designed: each with its reason, so that
//! none is designed by a method that does not hold for it.

use design_engine::floor::{EdgeState, Floor, PanelId, Side};
use design_engine::query::{Query, Severity, Subject};

use crate::actions::{Action, STEP_MM};
use crate::edge_states::Verdict;
use crate::gridlines::list;

/// Why a panel is not designed, and what to do about it.
struct Reason {
    /// The one side it is about, if it is one.
    side: Option<Side>,
    text: String,
    remedy: &'static str,
}

/// Marks panels that are not designed and says so. `verdicts` are those of the grid's panels.
pub(crate) fn mark_undesigned(
    actions: &[Action],
    verdicts: &[[Vec<Verdict>; 4]],
    floor: &mut Floor,
    queries: &mut Vec<Query>,
) {
    let none = Default::default();
    let reasons: Vec<Vec<Reason>> = (0..floor.panels.len())
        .map(|index| {
            edge_reasons(floor, PanelId(index), actions[index], verdicts.get(index).unwrap_or(&none))
        })
        .collect();
    for (panel, reasons) in floor.panels.iter_mut().zip(reasons) {
        for reason in &reasons {
            let subject = match reason.side {
                Some(side) => Subject::Edge { mark: panel.mark.clone(), side },
                None => Subject::Panel { mark: panel.mark.clone(), column: None },
            };
            queries.push(Query::new(Severity::NotDesigned, subject, reason.text.clone(), reason.remedy));
        }
        if !reasons.is_empty() {
            let texts: Vec<String> = reasons.into_iter().map(|reason| reason.text).collect();
            panel.not_designed = Some(texts.join("; "));
        }
    }
}

fn edge_reasons(floor: &Floor, id: PanelId, action: Action, verdicts: &[Vec<Verdict>; 4]) -> Vec<Reason> {
    let panel = floor.panel(id);
    let sides = |wanted: &dyn Fn(Side) -> bool| -> Vec<Side> {
        Side::ALL.into_iter().filter(|side| wanted(*side)).collect()
    };
    // `say` is given the edges in words and its verb.
    let about = |sides: Vec<Side>, say: &dyn Fn(&str, &str) -> String, remedy| {
        if sides.is_empty() {
            return None;
        }
        let words: Vec<&str> = sides.iter().map(|side| panel.side_word(*side)).collect();
        let many = sides.len() > 1;
        let kind = match (panel.is_loose(), many) {
            (true, _) => "",
            (false, false) => " edge",
            (false, true) => " edges",
        };
        let only = if let [side] = sides[..] { Some(side) } else { None };
        let text = say(&format!("the {}{kind}", list(&words)), if many { "are" } else { "is" });
        Some(Reason { side: only, text, remedy })
    };
    if let Action::Cantilever(root) = action {
        let held = Side::ALL
            .into_iter()
            .any(|side| root.is_some_and(|root| side != root) && panel.edge(side).state != EdgeState::Free);
        return cantilever_reason(panel.is_loose(), root, held).into_iter().collect();
    }
    let state = |side: Side| panel.edge(side).state;
    let unheld = about(
        sides(&|side| {
            let verdicts = &verdicts[side.index()];
            verdicts.contains(&Verdict::Free)
                && verdicts.iter().any(|verdict| *verdict != Verdict::Free)
                && !action.beside_span(side)
        }),
        &|edges, _| format!("part of {edges} has no support"),
        "end the panel where its support ends, or design it by hand",
    );
    let free = about(
        sides(&|side| state(side) == EdgeState::Free && !action.beside_span(side)),
        &|edges, are| format!("{edges} {are} free: outside the coefficient tables"),
        "give the edge a support, state the panel one-way between its supports, or design it by hand",
    );
    [unheld, free].into_iter().flatten().collect()
}

/// `held`: an edge besides the root is supported.
fn cantilever_reason(loose: bool, root: Option<Side>, held: bool) -> Option<Reason> {
    let (text, remedy) = match root {
        Some(_) if held => (
            "a cantilever's other three edges must be free".to_owned(),
            "leave the cells of its other edges blank, or do not state it a cantilever",
        ),
        Some(_) => return None,
        None if loose => (
            "a cantilever needs a back-span, which a loose panel has not".to_owned(),
            "give it a row in the Panels sheet beside its back-span",
        ),
        None => (
            format!(
                "a cantilever needs one edge, and only one, wholly against panels that carry its moment on, \
                 with a support, no joint and no step over {STEP_MM} mm"
            ),
            "check its gridlines and neighbours; state the edge it stands out from continuous",
        ),
    };
    Some(Reason { side: None, text, remedy })
}
