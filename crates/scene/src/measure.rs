//! Measuring a scene: which labels overlap, what leaves the page. Used by tests and by layout.

use crate::{
    geometry::{RectPt, bounds_of},
    scene::{Item, Label, Scene},
};

/// Pairs of labels whose measured boxes share an area.
#[must_use]
pub fn overlaps(scene: &Scene) -> Vec<(Label, Label)> {
    let boxed: Vec<(&Label, RectPt)> = scene.labels().map(|l| (l, l.bounds())).collect();
    let mut out = Vec::new();
    for (i, (a, ra)) in boxed.iter().enumerate() {
        for (b, rb) in &boxed[i + 1..] {
            if ra.meets(rb) {
                out.push(((*a).clone(), (*b).clone()));
            }
        }
    }
    out
}

/// The box of an item, the width of a line included; `None` for an empty one.
#[must_use]
pub fn bounds(item: &Item) -> Option<RectPt> {
    match item {
        Item::Fill(area, _) => area.bounds(),
        Item::Line { pts, width, .. } => bounds_of(pts).map(|r| r.grown(width / 2.0)),
        Item::Cells(cells) => Some(cells.area),
        Item::Text(label) => Some(label.bounds()),
    }
}

/// Items that reach over the edge of the page by more than half a page unit.
#[must_use]
pub fn out_of_page(scene: &Scene) -> Vec<Item> {
    let page = RectPt::page(scene.size).grown(0.5);
    scene.items.iter().filter(|i| bounds(i).is_some_and(|r| !page.holds(&r))).cloned().collect()
}

/// Areas and labels whose numbers are not finite; must be none.
#[must_use]
pub fn not_finite(scene: &Scene) -> usize {
    let whole = |r: RectPt| [r.min.x, r.min.y, r.max.x, r.max.y].iter().all(|v| v.is_finite());
    scene.items.iter().filter(|i| bounds(i).is_some_and(|r| !whole(r))).count()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::{
        geometry::{Pt, Size},
        scene::{Anchor, Weight},
        theme::Role,
    };

    fn label(x: f32, y: f32) -> Label {
        Label {
            baseline: Pt::new(x, y),
            anchor: Anchor::Start,
            size: 10.0,
            weight: Weight::Regular,
            role: Role::Ink,
            text: "thigh level".to_owned(),
        }
    }

    #[test]
    fn an_overlap_and_a_cut_are_found_and_their_absence_too() {
        let mut s = Scene::new(Size::new(200.0, 100.0), "");
        s.text(label(10.0, 20.0));
        s.text(label(10.0, 40.0));
        assert!(overlaps(&s).is_empty() && out_of_page(&s).is_empty());
        s.text(label(20.0, 24.0));
        assert_eq!(overlaps(&s).len(), 1);
        s.text(label(190.0, 80.0));
        assert_eq!(out_of_page(&s).len(), 1);
    }
}
