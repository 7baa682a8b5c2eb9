//! The curve piece by piece: where it starts, how it bends, the angle it turns.

use super::grid;
use crate::job::Job;
use crate::profile::{Profile, Tightest};
use crate::units::{LONG, PER_LENGTH, SHORT, Unit, Units};

/// Pieces, bends and least radii.
pub(super) fn part(job: &Job, profile: &Profile, in_plan: Option<Tightest>) -> String {
    let units = job.units;
    let (long, short, bend) = (units.of(LONG), units.of(SHORT), units.of(PER_LENGTH));
    let rise = match units {
        Units::Si => "g x + c x^2 / 2",
        Units::Us => "12 (g x + c x^2 / 2)",
    };
    let mut text = vec![format!(
        "2. Curve: z = z0 + {rise} on each piece, x from its start; hogging length: {}\n\
         \x20  angle of a piece straight in plan = |atan(g end) - atan(g start)|; on a plan arc the two turn together in space\n",
        hogging(job)
    )];
    let rows = profile
        .spans
        .iter()
        .map(|span| {
            vec![
                long.figure(span.start_m, 3),
                long.figure(span.end_m(), 3),
                short.figure(span.level_m * 1000.0, 2),
                format!("{:+.6}", span.slope),
                format!("{:+.6}", span.slope_at(span.length_m)),
                bend.signed(span.curvature_per_m, 6),
                radius(span.curvature_per_m, long),
                radius(span.plan_curvature_per_m, long),
                format!("{:.6}", span.angle_to(span.length_m)),
                long.figure(span.arc_length_to(span.length_m), 4),
            ]
        })
        .collect();
    text.push(grid(
        0,
        &[
            &format!("from {}", long.name),
            &format!("to {}", long.name),
            &format!("z0 {}", short.name),
            "g start",
            "g end",
            &format!("c 1{}", bend.name),
            &format!("radius {}", long.name),
            &format!("plan radius {}", long.name),
            "angle rad",
            &format!("length {}", long.name),
        ],
        rows,
    ));
    for bend in profile.bends.iter().filter(|bend| bend.angle_rad > 5e-7) {
        text.push(format!(
            "  bend at station {} (a bare vertex in plan, or a break in slope): {:.6} rad at one point\n",
            long.said(bend.station_m, 3),
            bend.angle_rad
        ));
    }
    text.push(format!(
        "  sum: {:.6} rad turned, {} along the tendon ({} in plan)\n",
        profile.total_angle_rad(),
        long.said(profile.length_m(), 4),
        long.said(profile.plan_length_m(), 4)
    ));
    for (what, tightest) in [
        ("least hogging radius", profile.hogging_radius_min_m()),
        ("least vertical radius", profile.radius_min_m()),
        ("least plan radius", in_plan),
    ] {
        if let Some(tightest) = tightest {
            text.push(format!(
                "  {what} {} at station {}\n",
                long.said(tightest.radius_m, 2),
                long.said(tightest.station_m, 3)
            ));
        }
    }
    text.concat()
}

/// How the hogging length came about.
fn hogging(job: &Job) -> String {
    let share = job.profile.inflection;
    if job.profile.fit_inflection {
        format!("fitted to the support heights, {share} of the span where there are none")
    } else {
        format!("{share} of the span")
    }
}

fn radius(curvature_per_m: f64, long: Unit) -> String {
    if curvature_per_m.abs() < 1e-9 {
        "-".to_owned()
    } else {
        long.figure(1.0 / curvature_per_m.abs(), 2)
    }
}
