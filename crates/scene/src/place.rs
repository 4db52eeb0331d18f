//! Placing labels so that none overlaps another, none leaves the page, and few lie on lines.
//!
//! Hard: the page, and every box taken so far. Soft, at a cost: lines and areas to stay off.
//! Candidates come in order of preference; each later one costs a little more, so that a label
//! stays where it was while a figure moves unless something is in its way.

use crate::{
    fonts,
    geometry::{Convex, Pt, RectPt},
    scene::{Anchor, Label, Weight},
    theme::Role,
};

/// What a label says and looks like, before it has a place.
#[derive(Clone, Debug, PartialEq)]
pub struct Wanted {
    /// The text.
    pub text: String,
    /// Font size, page units.
    pub size: f32,
    /// Weight.
    pub weight: Weight,
    /// Colour role.
    pub role: Role,
}

impl Wanted {
    /// A label at a baseline.
    #[must_use]
    pub fn at(&self, baseline: Pt, anchor: Anchor) -> Label {
        Label { baseline, anchor, size: self.size, weight: self.weight, role: self.role, text: self.text.clone() }
    }

    /// A label whose box has its middle here.
    #[must_use]
    pub fn centred(&self, middle: Pt) -> Label {
        let half = (fonts::INK_ABOVE - fonts::INK_BELOW) / 2.0 * self.size;
        self.at(middle + Pt::new(0.0, half), Anchor::Middle)
    }

    /// A label beside a target, in a direction, at a distance from it.
    #[must_use]
    pub fn beside(&self, target: Pt, direction: Pt, distance: f32) -> Label {
        let u = direction.unit();
        let (w, h) = (fonts::text_width(&self.text, self.size, self.weight), self.size);
        let anchor = if u.x > 0.3 {
            Anchor::Start
        } else if u.x < -0.3 {
            Anchor::End
        } else {
            Anchor::Middle
        };
        let x = target.x
            + match anchor {
                Anchor::Start | Anchor::End => u.x * distance,
                Anchor::Middle => u.x * (distance + w / 2.0),
            };
        let middle_y = target.y + u.y * (distance + h / 2.0);
        self.at(Pt::new(x, middle_y + (fonts::INK_ABOVE - fonts::INK_BELOW) / 2.0 * self.size), anchor)
    }
}

/// One or more lines set under each other, placed as one.
#[derive(Clone, Debug, PartialEq)]
pub struct Block {
    /// The lines from the top.
    pub lines: Vec<Wanted>,
}

impl Block {
    /// A block of one line.
    #[must_use]
    pub fn line(wanted: Wanted) -> Self {
        Self { lines: vec![wanted] }
    }

    /// Width and height of the block, page units.
    #[must_use]
    pub fn size(&self) -> (f32, f32) {
        let w = self.lines.iter().map(|l| fonts::text_width(&l.text, l.size, l.weight)).fold(0.0, f32::max);
        let gaps = LEADING * self.lines.iter().skip(1).map(|l| l.size).sum::<f32>();
        (w, self.lines.iter().map(|l| l.size).sum::<f32>() + gaps)
    }

    /// Largest font size in it.
    #[must_use]
    pub fn font(&self) -> f32 {
        self.lines.iter().map(|l| l.size).fold(0.0, f32::max)
    }

    /// The block beside a target, in a direction, at a distance from it.
    fn beside(&self, (w, h): (f32, f32), target: Pt, direction: Pt, distance: f32) -> Vec<Label> {
        let u = direction.unit();
        let anchor = if u.x > 0.3 {
            Anchor::Start
        } else if u.x < -0.3 {
            Anchor::End
        } else {
            Anchor::Middle
        };
        let x = target.x
            + match anchor {
                Anchor::Start | Anchor::End => u.x * distance,
                Anchor::Middle => u.x * (distance + w / 2.0),
            };
        let mut top = target.y + u.y * (distance + h / 2.0) - h / 2.0;
        let mut out = Vec::with_capacity(self.lines.len());
        for (i, l) in self.lines.iter().enumerate() {
            if i > 0 {
                top += LEADING * l.size;
            }
            out.push(l.at(Pt::new(x, top + fonts::INK_ABOVE * l.size), anchor));
            top += l.size;
        }
        out
    }
}

/// What each later candidate costs more than the one before it.
const PREFERENCE: f32 = 0.7;

/// Space between the lines of a block, em.
const LEADING: f32 = 0.22;

/// Finds free places on a page.
#[derive(Clone, Debug)]
pub struct Placer {
    page: RectPt,
    taken: Vec<RectPt>,
    lines: Vec<(Pt, Pt, f32)>,
    areas: Vec<(Convex, f32)>,
    gap: f32,
}

impl Placer {
    /// A page with nothing on it; labels keep `gap` page units from each other.
    #[must_use]
    pub fn new(page: RectPt, gap: f32) -> Self {
        Self { page, taken: Vec::new(), lines: Vec::new(), areas: Vec::new(), gap }
    }

    /// Nothing may be placed here.
    pub fn take(&mut self, area: RectPt) {
        self.taken.push(area);
    }

    /// Better not across this line.
    pub fn avoid_line(&mut self, pts: &[Pt], cost: f32) {
        self.lines.extend(pts.windows(2).map(|p| (p[0], p[1], cost)));
    }

    /// Better not on this area.
    pub fn avoid_area(&mut self, area: &Convex, cost: f32) {
        if !area.is_empty() {
            self.areas.push((area.clone(), cost));
        }
    }

    /// Whether a box lies on the page clear of everything taken.
    #[must_use]
    pub fn is_free(&self, area: &RectPt) -> bool {
        self.page.holds(area) && !self.taken.iter().any(|t| t.meets(&area.grown(self.gap)))
    }

    /// Cost of the soft obstacles under a box.
    fn cost(&self, area: &RectPt) -> f32 {
        let near = area.grown(1.5);
        let lines: f32 = self.lines.iter().filter(|(a, b, _)| near.clip(*a, *b).is_some()).map(|l| l.2).sum();
        let areas: f32 = self
            .areas
            .iter()
            .filter(|(a, _)| a.bounds().is_some_and(|b| b.meets(&near)) && touches(a, &near))
            .map(|a| a.1)
            .sum();
        lines + areas
    }

    /// Whether a box crosses a line while it lies on none of the areas: a plate of paper under it
    /// then keeps its text clear.
    #[must_use]
    pub fn wants_plate(&self, area: &RectPt) -> bool {
        self.lines.iter().any(|(a, b, _)| area.clip(*a, *b).is_some())
            && !self.areas.iter().any(|(a, _)| a.bounds().is_some_and(|b| b.meets(area)) && touches(a, area))
    }

    /// The best of some candidates in order of preference; takes its place. `None` where none is free.
    pub fn place(&mut self, candidates: impl IntoIterator<Item = Vec<Label>>) -> Option<Vec<Label>> {
        let mut best: Option<(f32, Vec<Label>, RectPt)> = None;
        for (i, labels) in candidates.into_iter().enumerate() {
            let preference = PREFERENCE * i as f32;
            if best.as_ref().is_some_and(|b| b.0 <= preference) {
                break;
            }
            let Some(area) = labels.iter().map(Label::bounds).reduce(|a, b| a.around(&b)) else { continue };
            if !self.is_free(&area) {
                continue;
            }
            let cost = preference + self.cost(&area);
            if best.as_ref().is_none_or(|b| cost < b.0) {
                best = Some((cost, labels, area));
            }
        }
        let (_, labels, area) = best?;
        self.taken.push(area);
        Some(labels)
    }
}

/// Whether an area and a rectangle share a place (corners, or the rectangle's middle).
fn touches(area: &Convex, r: &RectPt) -> bool {
    r.corners().iter().any(|&c| area.contains(c))
        || area.points().iter().any(|&p| r.contains(p))
        || area.contains(r.middle())
}

/// Candidates around a target: the wished direction first, then turning away from it to both
/// sides, then farther out.
pub fn around(block: &Block, target: Pt, wish: Pt, near: f32) -> impl Iterator<Item = Vec<Label>> + '_ {
    let start = wish.y.atan2(wish.x);
    let (size, font) = (block.size(), block.font());
    (0..6).flat_map(move |ring| {
        let distance = near + font * 0.9 * ring as f32;
        [0.0_f32, 0.4, -0.4, 0.8, -0.8, 1.2, -1.2, 1.7, -1.7, 2.3, -2.3, 3.1].into_iter().map(move |turn| {
            let (s, c) = (start + turn).sin_cos();
            block.beside(size, target, Pt::new(c, s), distance)
        })
    })
}

/// Heights for labels in one column: each as near its wish as it can, in the order of the wishes,
/// at least `pitch` apart and within `low..=high`. Where they do not all fit, the pitch shrinks.
#[must_use]
pub fn stack(wishes: &[f32], pitch: f32, low: f32, high: f32) -> Vec<f32> {
    let n = wishes.len();
    if n == 0 {
        return Vec::new();
    }
    let mut order: Vec<usize> = (0..n).collect();
    order.sort_by(|&a, &b| wishes[a].total_cmp(&wishes[b]));
    let pitch = if n > 1 { pitch.min(((high - low) / (n - 1) as f32).max(0.0)) } else { pitch };
    // groups of labels that touch, each centred on the mean of its wishes
    let mut groups: Vec<(f32, usize)> = Vec::new(); // first height, count
    let mut starts: Vec<f32> = Vec::new(); // sum of wishes less their offset in the group
    let settle = |sum: f32, count: usize| {
        let top = sum / count as f32;
        top.min(high - pitch * (count - 1) as f32).max(low)
    };
    for &i in &order {
        let (mut sum, mut count) = (wishes[i], 1);
        let mut top = settle(sum, count);
        while let (Some(&(before_top, before_count)), Some(&before_sum)) = (groups.last(), starts.last()) {
            if before_top + pitch * before_count as f32 <= top + 1e-4 {
                break;
            }
            groups.pop();
            starts.pop();
            sum = before_sum + sum - pitch * (before_count * count) as f32;
            count += before_count;
            top = settle(sum, count);
        }
        groups.push((top, count));
        starts.push(sum);
    }
    let mut out = vec![0.0; n];
    let mut at = order.into_iter();
    for (top, count) in groups {
        for k in 0..count {
            if let Some(i) = at.next() {
                out[i] = top + pitch * k as f32;
            }
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    fn wanted(text: &str) -> Block {
        Block::line(Wanted { text: text.to_owned(), size: 14.0, weight: Weight::Regular, role: Role::Ink })
    }

    #[test]
    fn a_second_label_at_the_same_target_goes_elsewhere() {
        let mut p = Placer::new(RectPt::at(0.0, 0.0, 300.0, 200.0), 2.0);
        let target = Pt::new(150.0, 100.0);
        let a = p.place(around(&wanted("knee 99°"), target, Pt::new(1.0, 0.0), 10.0)).expect("free");
        let b = p.place(around(&wanted("shank 27°"), target, Pt::new(1.0, 0.0), 10.0)).expect("free");
        assert!(!a[0].bounds().meets(&b[0].bounds()));
        assert!(a[0].bounds().min.x > target.x);
    }

    #[test]
    fn a_full_page_gives_no_place() {
        let mut p = Placer::new(RectPt::at(0.0, 0.0, 300.0, 200.0), 2.0);
        p.take(RectPt::at(0.0, 0.0, 300.0, 200.0));
        assert!(p.place(around(&wanted("x"), Pt::new(150.0, 100.0), Pt::new(1.0, 0.0), 10.0)).is_none());
    }

    #[test]
    fn a_line_is_avoided_where_another_place_is_near() {
        let mut p = Placer::new(RectPt::at(0.0, 0.0, 300.0, 200.0), 2.0);
        let target = Pt::new(150.0, 100.0);
        p.avoid_line(&[Pt::new(180.0, 0.0), Pt::new(180.0, 200.0)], 30.0);
        let a = p.place(around(&wanted("knee 99°"), target, Pt::new(1.0, 0.0), 10.0)).expect("free");
        assert!(a[0].bounds().clip(Pt::new(180.0, 0.0), Pt::new(180.0, 200.0)).is_none());
    }

    #[test]
    fn a_stack_keeps_order_pitch_and_ends() {
        let wishes = [50.0, 52.0, 51.0, 90.0, 5.0];
        let got = stack(&wishes, 10.0, 0.0, 100.0);
        let mut sorted = got.clone();
        sorted.sort_by(f32::total_cmp);
        for w in sorted.windows(2) {
            assert!(w[1] - w[0] >= 10.0 - 1e-3, "{sorted:?}");
        }
        assert!(got[0] < got[2] && got[2] < got[1], "{got:?}");
        assert!((got[3] - 90.0).abs() < 1e-3 && (got[4] - 5.0).abs() < 1e-3);
        let crowded = stack(&[10.0; 8], 20.0, 0.0, 70.0);
        assert!(crowded.iter().all(|&y| (-0.01..=70.01).contains(&y)), "{crowded:?}");
    }
}
