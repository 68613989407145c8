//! The keys of a sheet: which table knows which, with an example of each.

use super::robot::HipShape;

/// A key that a table knows.
pub(super) struct Key {
    pub(super) name: &'static str,
    /// A line that gives it.
    pub(super) example: &'static str,
}

/// A key that belongs to a sister of this table, with what to do about it.
pub(super) struct Stray {
    pub(super) name: &'static str,
    /// The key that says the same here, if there is one.
    pub(super) instead: Option<&'static str>,
    /// Where it belongs, as a clause about the key.
    pub(super) belongs: &'static str,
}

/// Everything that one table may hold.
pub(super) struct Vocabulary {
    /// What the table is, for messages: "a servo".
    pub(super) table: &'static str,
    pub(super) keys: &'static [Key],
    pub(super) strays: &'static [Stray],
}

impl Vocabulary {
    pub(super) fn names(&self) -> impl Iterator<Item = &'static str> {
        self.keys.iter().map(|key| key.name)
    }

    pub(super) fn example(&self, name: &str) -> &'static str {
        self.keys.iter().find(|key| key.name == name).map_or("", |key| key.example)
    }
}

const fn key(name: &'static str, example: &'static str) -> Key {
    Key { name, example }
}

const fn stray(name: &'static str, instead: Option<&'static str>, belongs: &'static str) -> Stray {
    Stray { name, instead, belongs }
}

const OF_ROLL_HIP: &str = "belongs to a roll-hip leg, and this one is `hip = \"yaw\"`";
const OF_YAW_HIP: &str = "belongs to a yaw-hip leg, and this one is `hip = \"roll\"`";
const OF_TIMER: &str = "belongs to a timer, and this output is `kind = \"expander\"`";
const OF_EXPANDER: &str = "belongs to an expander, and this output is `kind = \"timer\"`";

pub(super) static SHEET: Vocabulary = Vocabulary {
    table: "a robot sheet",
    keys: &[
        key("name", "name = \"culvert walker\""),
        key("about", "about = \"Six yaw-hip legs\""),
        key("firmware", "[firmware]"),
        key("output", "[output]"),
        key("leg_kind", "[leg_kind.walker]"),
        key("leg", "[[leg]]"),
        key("allowed", "[allowed]"),
    ],
    strays: &[],
};

pub(super) static FIRMWARE: Vocabulary = Vocabulary {
    table: "[firmware]",
    keys: &[key("numbers", "numbers = [\"fixed32\"]"), key("frame_hz", "frame_hz = 50")],
    strays: &[],
};

pub(super) static TIMER: Vocabulary = Vocabulary {
    table: "a timer output",
    keys: &[
        key("kind", "kind = \"timer\""),
        key("clock_hz", "clock_hz = 48_000_000"),
        key("counter_bits", "counter_bits = 16"),
        key("frame_hz", "frame_hz = 50"),
        key("prescaler", "prescaler = 15"),
    ],
    strays: &[
        stray("oscillator_hz", Some("clock_hz"), OF_EXPANDER),
        stray("resolution_bits", Some("counter_bits"), OF_EXPANDER),
    ],
};

pub(super) static EXPANDER: Vocabulary = Vocabulary {
    table: "an expander output",
    keys: &[
        key("kind", "kind = \"expander\""),
        key("oscillator_hz", "oscillator_hz = 25_000_000"),
        key("resolution_bits", "resolution_bits = 12"),
        key("frame_hz", "frame_hz = 50"),
    ],
    strays: &[
        stray("clock_hz", Some("oscillator_hz"), OF_TIMER),
        stray("counter_bits", Some("resolution_bits"), OF_TIMER),
        stray(
            "prescaler",
            None,
            "belongs to a timer; an expander's follows from its oscillator and frame rate",
        ),
    ],
};

pub(super) static YAW_KIND: Vocabulary = Vocabulary {
    table: "a yaw-hip leg kind",
    keys: &[
        key("hip", "hip = \"yaw\""),
        key("coxa_mm", "coxa_mm = 42.0"),
        key("femur_mm", "femur_mm = 71.0"),
        key("tibia_mm", "tibia_mm = 118.0"),
        key("knee_bends", "knee_bends = \"up\""),
        key("knee_drive", "knee_drive = \"direct\""),
        key("range_deg", "[leg_kind.walker.range_deg]"),
        key("servo", "[leg_kind.walker.servo.hip]"),
        key("work", "[leg_kind.walker.work]"),
    ],
    strays: &[
        stray("hip_offset_mm", Some("coxa_mm"), OF_ROLL_HIP),
        stray("thigh_mm", Some("femur_mm"), OF_ROLL_HIP),
        stray("shank_mm", Some("tibia_mm"), OF_ROLL_HIP),
    ],
};

pub(super) static ROLL_KIND: Vocabulary = Vocabulary {
    table: "a roll-hip leg kind",
    keys: &[
        key("hip", "hip = \"roll\""),
        key("hip_offset_mm", "hip_offset_mm = 31.5"),
        key("thigh_mm", "thigh_mm = 94.0"),
        key("shank_mm", "shank_mm = 107.0"),
        key("knee_bends", "knee_bends = \"forward\""),
        key("knee_drive", "knee_drive = \"direct\""),
        key("range_deg", "[leg_kind.walker.range_deg]"),
        key("servo", "[leg_kind.walker.servo.hip]"),
        key("work", "[leg_kind.walker.work]"),
    ],
    strays: &[
        stray("coxa_mm", Some("hip_offset_mm"), OF_YAW_HIP),
        stray("femur_mm", Some("thigh_mm"), OF_YAW_HIP),
        stray("tibia_mm", Some("shank_mm"), OF_YAW_HIP),
    ],
};

static YAW_RANGES: Vocabulary = Vocabulary {
    table: "the joint ranges of a yaw-hip leg",
    keys: &[
        key("hip", "hip = [-50, 50]"),
        key("femur", "femur = [-45, 85]"),
        key("knee", "knee = [10, 150]"),
    ],
    strays: &[stray("thigh", Some("femur"), OF_ROLL_HIP)],
};

static ROLL_RANGES: Vocabulary = Vocabulary {
    table: "the joint ranges of a roll-hip leg",
    keys: &[
        key("hip", "hip = [-40, 40]"),
        key("thigh", "thigh = [-45, 85]"),
        key("knee", "knee = [10, 150]"),
    ],
    strays: &[stray("femur", Some("thigh"), OF_YAW_HIP)],
};

static YAW_SERVOS: Vocabulary = Vocabulary {
    table: "the servos of a yaw-hip leg",
    keys: &[
        key("hip", "[leg_kind.walker.servo.hip]"),
        key("femur", "[leg_kind.walker.servo.femur]"),
        key("knee", "[leg_kind.walker.servo.knee]"),
    ],
    strays: &[stray("thigh", Some("femur"), OF_ROLL_HIP)],
};

static ROLL_SERVOS: Vocabulary = Vocabulary {
    table: "the servos of a roll-hip leg",
    keys: &[
        key("hip", "[leg_kind.walker.servo.hip]"),
        key("thigh", "[leg_kind.walker.servo.thigh]"),
        key("knee", "[leg_kind.walker.servo.knee]"),
    ],
    strays: &[stray("femur", Some("thigh"), OF_YAW_HIP)],
};

static YAW_TRIMS: Vocabulary = Vocabulary {
    table: "the trims of a yaw-hip leg",
    keys: &[
        key("hip", "trim_us = { hip = 8 }"),
        key("femur", "trim_us = { femur = 5 }"),
        key("knee", "trim_us = { knee = -12 }"),
    ],
    strays: &[stray("thigh", Some("femur"), OF_ROLL_HIP)],
};

static ROLL_TRIMS: Vocabulary = Vocabulary {
    table: "the trims of a roll-hip leg",
    keys: &[
        key("hip", "trim_us = { hip = 8 }"),
        key("thigh", "trim_us = { thigh = 5 }"),
        key("knee", "trim_us = { knee = -12 }"),
    ],
    strays: &[stray("femur", Some("thigh"), OF_YAW_HIP)],
};

pub(super) static STRAIGHT_SERVO: Vocabulary = Vocabulary {
    table: "a servo",
    keys: &[
        key("centre_us", "centre_us = 1500"),
        key("joint_at_centre_deg", "joint_at_centre_deg = 0"),
        key("us_per_degree", "us_per_degree = 11.1"),
        key("turns", "turns = \"with\""),
        key("measured", MEASURED),
        key("pulse_us", "pulse_us = [600, 2400]"),
        key("dead_band_us", "dead_band_us = 4"),
        key("speed_s_per_60_deg", "speed_s_per_60_deg = 0.16"),
        key("stall_torque_n_mm", "stall_torque_n_mm = 1200"),
        key("slew_us_per_frame", "slew_us_per_frame = 80"),
        key("start_us", "start_us = 1500"),
    ],
    strays: &[],
};

const MEASURED: &str = "measured = [[600, -79.5], [1500, 0], [2400, 83]]";
const OF_STRAIGHT: &str = "belongs to a servo without `measured`, and this one has it";

pub(super) static MEASURED_SERVO: Vocabulary = Vocabulary {
    table: "a servo with `measured`",
    keys: &[
        key("measured", MEASURED),
        key("pulse_us", "pulse_us = [600, 2400]"),
        key("dead_band_us", "dead_band_us = 4"),
        key("speed_s_per_60_deg", "speed_s_per_60_deg = 0.16"),
        key("stall_torque_n_mm", "stall_torque_n_mm = 1200"),
        key("slew_us_per_frame", "slew_us_per_frame = 80"),
        key("start_us", "start_us = 1500"),
    ],
    strays: &[
        stray("centre_us", None, OF_STRAIGHT),
        stray("joint_at_centre_deg", None, OF_STRAIGHT),
        stray("us_per_degree", None, OF_STRAIGHT),
        stray("turns", None, OF_STRAIGHT),
    ],
};

pub(super) static WORK: Vocabulary = Vocabulary {
    table: "a work volume",
    keys: &[
        key("x_mm", "x_mm = [-60, 60]"),
        key("y_mm", "y_mm = [70, 190]"),
        key("z_mm", "z_mm = [-130, -30]"),
    ],
    strays: &[],
};

pub(super) static LEG: Vocabulary = Vocabulary {
    table: "a leg",
    keys: &[
        key("name", "name = \"left front\""),
        key("kind", "kind = \"walker\""),
        key("side", "side = \"left\""),
        key("at_mm", "at_mm = [90.0, 60.0, 0.0]"),
        key("trim_us", "trim_us = { hip = 8 }"),
    ],
    strays: &[],
};

pub(super) static ALLOWED: Vocabulary = Vocabulary {
    table: "[allowed]",
    keys: &[
        key("arithmetic_mm", "arithmetic_mm = 0.01"),
        key("with_pulse_mm", "with_pulse_mm = 1.2"),
        key("unreached_percent", "unreached_percent = 5.0"),
    ],
    strays: &[],
};

/// What the two hip shapes call things.
pub(super) struct ShapeWords {
    pub(super) kind: &'static Vocabulary,
    pub(super) ranges: &'static Vocabulary,
    pub(super) servos: &'static Vocabulary,
    pub(super) trims: &'static Vocabulary,
    /// Keys of the offset, the upper and the lower link.
    pub(super) lengths: [&'static str; 3],
}

/// The words of a hip shape.
pub(super) const fn of_shape(shape: HipShape) -> ShapeWords {
    match shape {
        HipShape::Yaw => ShapeWords {
            kind: &YAW_KIND,
            ranges: &YAW_RANGES,
            servos: &YAW_SERVOS,
            trims: &YAW_TRIMS,
            lengths: ["coxa_mm", "femur_mm", "tibia_mm"],
        },
        HipShape::Roll => ShapeWords {
            kind: &ROLL_KIND,
            ranges: &ROLL_RANGES,
            servos: &ROLL_SERVOS,
            trims: &ROLL_TRIMS,
            lengths: ["hip_offset_mm", "thigh_mm", "shank_mm"],
        },
    }
}
