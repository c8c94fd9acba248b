//! Warnings accepted with a reason.

use layshaft_diagnostics::{Code, Diagnostic, FileSpan, Severity};
use layshaft_syntax::{Allow, ItemKind};

use crate::analysis::{Accepted, Analysis};
use crate::eval::Shared;
use crate::world::ItemRef;

struct Allowed<'w> {
    allow: &'w Allow,
    at: ItemRef,
    code: Code,
    /// The item it is limited to; the whole file where it stands on a line of its own.
    within: Option<FileSpan>,
    used: bool,
}

/// Sorts the findings into those that stand and those accepted.
pub(crate) fn accept(shared: Shared<'_>, found: Vec<Diagnostic>, analysis: &mut Analysis) {
    let mut complaints = Vec::new();
    let mut allowed = gather(shared, &mut complaints);
    let mut standing = Vec::new();
    for finding in found {
        let hit = allowed.iter_mut().find(|one| {
            let place = finding.primary.place;
            let inside = one.within.is_none_or(|within| {
                within.file == place.file
                    && within.span.start <= place.span.start
                    && place.span.end <= within.span.end
            });
            finding.severity != Severity::Error
                && one.code == finding.code
                && one.at.file == place.file.0
                && inside
        });
        match hit {
            Some(one) => {
                one.used = true;
                analysis.accepted.push(Accepted {
                    diagnostic: finding,
                    because: one.allow.because.value.to_string(),
                    place: shared.world.place(one.at, one.allow.span),
                });
            }
            None => standing.push(finding),
        }
    }
    // An error can hide the warning that is allowed: nothing is said to be unused before it is mended.
    let sound = standing.iter().all(|finding| finding.severity != Severity::Error);
    for one in allowed.iter().filter(|one| sound && !one.used && one.at.file == 0) {
        let message = format!("nothing here raises `{}`", one.allow.code.text);
        let place = shared.world.place(one.at, one.allow.span);
        complaints.push(Diagnostic::new(Code::UnusedAllow, place, message).help("take the line out"));
    }
    standing.extend(complaints);
    standing.sort_by_key(|found| (found.primary.place, found.code));
    analysis.diagnostics = standing;
}

fn gather<'w>(shared: Shared<'w>, complaints: &mut Vec<Diagnostic>) -> Vec<Allowed<'w>> {
    let mut all = Vec::new();
    for file in 0..shared.world.files.len() as u32 {
        for (at, tree) in shared.world.items(file) {
            let whole = shared.world.place(at, tree.span);
            let (allows, within): (&[Allow], _) = match &tree.kind {
                ItemKind::Allow(allow) => (std::slice::from_ref(allow), None),
                ItemKind::Part { block, .. } => (&block.allows, Some(whole)),
                ItemKind::Drive { block: Some(block), .. } | ItemKind::Case { block: Some(block), .. } => {
                    (&block.allows, Some(whole))
                }
                _ => continue,
            };
            for allow in allows {
                let place = shared.world.place(at, allow.code.span);
                match Code::from_word(&allow.code.text) {
                    Some(code) if code.row().severity != Severity::Error => {
                        all.push(Allowed { allow, at, code, within, used: false });
                    }
                    Some(_) => {
                        let message =
                            format!("`{}` is an error; only warnings can be allowed", allow.code.text);
                        complaints.push(Diagnostic::new(Code::BadAllow, place, message));
                    }
                    None => {
                        let message = format!("there is no code `{}`", allow.code.text);
                        let found = Diagnostic::new(Code::BadAllow, place, message);
                        let words = layshaft_diagnostics::CODES.iter().map(|code| code.row().word);
                        complaints.push(match layshaft_units::closest(&allow.code.text, words) {
                            Some(close) => found.fix(format!("write `{close}`"), place, close),
                            None => found.help("`layshaft explain` lists the codes"),
                        });
                    }
                }
            }
        }
    }
    all
}
