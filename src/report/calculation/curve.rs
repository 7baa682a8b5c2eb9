//! The curve piece by piece: where it starts, how it bends, the angle it turns.

use super::{grid, number};
use crate::job::Job;
use crate::profile::{Profile, Tightest};

/// Pieces, bends and least radii.
pub(super) fn part(job: &Job, profile: &Profile, in_plan: Option<Tightest>) -> String {
    let mut text = vec![format!(
        "2. Curve: z = z0 + g x + c x^2 / 2 on each piece, x from its start; hogging length: {}\n\
         \x20  angle of a piece straight in plan = |atan(g end) - atan(g start)|; on a plan arc the two turn together in space\n",
        hogging(job)
    )];
    let rows = profile
        .spans
        .iter()
        .map(|span| {
            vec![
                format!("{:.3}", span.start_m),
                format!("{:.3}", span.end_m()),
                format!("{:.2}", span.level_m * 1000.0),
                format!("{:+.6}", span.slope),
                format!("{:+.6}", span.slope_at(span.length_m)),
                format!("{:+.6}", span.curvature_per_m),
                radius(span.curvature_per_m),
                radius(span.plan_curvature_per_m),
                format!("{:.6}", span.angle_to(span.length_m)),
                format!("{:.4}", span.arc_length_to(span.length_m)),
            ]
        })
        .collect();
    text.push(grid(
        0,
        &[
            "from m",
            "to m",
            "z0 mm",
            "g start",
            "g end",
            "c 1/m",
            "radius m",
            "plan radius m",
            "angle rad",
            "length m",
        ],
        rows,
    ));
    for bend in profile.bends.iter().filter(|bend| bend.angle_rad > 5e-7) {
        text.push(format!(
            "  bend at station {:.3} m (a bare vertex in plan, or a break in slope): {:.6} rad at one point\n",
            bend.station_m, bend.angle_rad
        ));
    }
    text.push(format!(
        "  sum: {:.6} rad turned, {:.4} m along the tendon ({:.4} m in plan)\n",
        profile.total_angle_rad(),
        profile.length_m(),
        profile.plan_length_m()
    ));
    for (what, tightest) in [
        ("least hogging radius", profile.hogging_radius_min_m()),
        ("least vertical radius", profile.radius_min_m()),
        ("least plan radius", in_plan),
    ] {
        if let Some(tightest) = tightest {
            text.push(format!(
                "  {what} {} m at station {:.3} m\n",
                number(Some(tightest.radius_m), 2),
                tightest.station_m
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

fn radius(curvature_per_m: f64) -> String {
    if curvature_per_m.abs() < 1e-9 {
        "-".to_owned()
    } else {
        format!("{:.2}", 1.0 / curvature_per_m.abs())
    }
}
