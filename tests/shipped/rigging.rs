//! Expected numbers of the scenarios with tables, grabs, retractable lines, edges, swings and lifelines.
//!
//! Not taken from this program. Free falls and slack by the triangles and arcs noted in each file. Motions by an
//! integration written apart from the solvers, in another language: fourth order, 10 us (swings 20 us) a step, events by
//! bisection inside the step, plane motion in offset and elevation, no series and no tables of knots. Doubling the step
//! moved no value by more than 2e-9 of itself.

use super::Expected;

/// Vertical runs and swings: as close as the integration is.
pub const EXACT: &[Expected] = &[
    (
        // sqrt(1.3^2 - 0.5^2) = 1.2 below the edge at 8.0; 9.5 - 6.8 = 2.7; v0 = sqrt(2 g 2.7).
        "canopy-edge",
        &[
            ("free_fall_distance", 2.7),
            ("speed_at_taut", 7.277_081_145_62),
            ("arrest_force_peak", 4_000.0),
            ("time_peak_force", 0.747_080_960_07),
            ("time_lowest", 0.947_008_778_304),
            ("time_first_slack", 1.016_917_542_8),
            ("lowest_attachment", 6.039_326_460_97),
            ("swing_drop", 0.760_673_539_03),
            ("swing_speed_lowest", 2.267_804_069_52),
            ("deployed_length", 0.598_723_267_878),
            ("swing_offset_peak", 1.512_533_156_53),
            ("swing_angle_peak", 0.555_598_145_056),
            ("closest_approach.wall_of_the_hall", 1.237_466_843_47),
        ],
    ),
    (
        // Two dampers on a rising force; m g / k of both and the deployed length.
        "damped-harness-rising-absorber",
        &[
            ("free_fall_distance", 2.6),
            ("arrest_force_peak", 3_710.774_524_08),
            ("time_peak_force", 0.986_977_518_367),
            ("line_elongation_peak", 0.052_991_247_5),
            ("arrest_distance", 1.024_637_463_625),
            ("deployed_length", 0.849_621_339_587),
            ("time_lowest", 0.988_380_622_279),
            ("time_first_slack", 1.104_614_809_734),
            ("slack_episodes", 1.0),
            ("rebound_rise", 0.231_142_293_443),
            ("settle_time", 1.776_642_570_548),
            ("hang_travel", 0.890_715_872_92),
            ("damper_work", 163.336_487_884),
            ("absorber_work", 2_643.039_257_309),
        ],
    ),
    (
        // Forces of the table times 1.3.
        "frozen-absorber",
        &[
            ("free_fall_distance", 1.9),
            ("speed_at_taut", 6.104_528_646_83),
            ("arrest_force_peak", 4_107.741_531),
            ("time_peak_force", 0.849_205_611_343),
            ("arrest_distance", 0.751_596_645_355),
            ("deployed_length", 0.683_167_648_337),
            ("time_lowest", 0.849_371_089_707),
            ("time_first_slack", 0.925_649_504_6),
            // The deployed length and m g / k.
            ("hang_travel", 0.699_512_065_004),
            ("rebound_rise", 0.118_353_187_245),
            ("lowest_foot", 6.048_403_354_645),
        ],
    ),
    (
        // 1 / (1/60 + 1/300) = 50 kN/m; 50^2 (500/60^2 + 1000/300^2) = 375 N s/m. F/k1, F/k2 while it deploys.
        "harness-and-post",
        &[
            ("free_fall_distance", 2.3),
            ("speed_at_taut", 6.716_441_766_29),
            ("arrest_force_peak", 4_000.0),
            ("time_peak_force", 0.699_551_013_903),
            ("line_elongation_peak", 0.057_142_857_142_9),
            ("arrest_distance", 0.742_975_789_527),
            ("deployed_length", 0.605_832_932_384),
            ("time_lowest", 0.899_529_091_882),
            ("time_first_slack", 1.005_703_749_5),
            ("hang_travel", 0.637_774_592_384),
            ("lowest_foot", 6.957_024_210_473),
        ],
    ),
    (
        // sqrt(2.4^2 - 1.2^2) - 1.6 = 0.4784609690827 (line 2.0 at the start, 2.4 at lock); 30 degrees when taut.
        "retractable-beside",
        &[
            ("free_fall_distance", 0.478_460_969_083),
            ("speed_at_taut", 3.063_363_923_03),
            ("arrest_force_peak", 4_000.0),
            ("time_peak_force", 0.325_199_310_926),
            ("time_lowest", 0.882_913_128_287),
            ("lowest_attachment", 5.600_633_813_06),
            ("swing_drop", 0.420_905_217_861),
            ("swing_speed_lowest", 2.904_061_968_78),
            ("deployed_length", 0.070_655_774_304),
            ("swing_offset_peak", 2.612_723_384_11),
            ("swing_angle_peak", 0.605_059_370_315),
            ("closest_approach.press", 0.737_276_615_89),
        ],
    ),
    (
        "retractable-overhead",
        &[
            ("free_fall_distance", 0.5),
            ("arrest_force_peak", 4_500.0),
            ("time_peak_force", 0.331_012_990_768),
            ("arrest_distance", 0.157_042_588_94),
            ("deployed_length", 0.112_042_588_94),
            ("stroke_left", 0.787_957_411_06),
            ("time_lowest", 0.414_033_011_292),
            ("time_first_slack", 0.471_998_241_7),
            ("rebound_rise", 0.091_116_186_394_6),
            ("hang_travel", 0.121_849_238_94),
            ("lowest_foot", 5.042_957_411_06),
        ],
    ),
    (
        // Hang: 735.49875 N on the piece of 6 + 9 (e - 0.1) kN: 0.1 + 135.49875 / 9000.
        "rope-by-table",
        &[
            ("free_fall_distance", 1.1),
            ("fall_factor", 0.55),
            ("arrest_force_peak", 4_742.877_032),
            ("time_peak_force", 0.613_786_069_5),
            ("arrest_distance", 0.464_898_373_538),
            ("time_lowest", 0.623_396_692_617),
            ("time_first_slack", 0.771_903_639_6),
            ("rebound_rise", 1.004_437_479_019),
            ("hang_travel", 0.115_055_416_667),
            ("lowest_foot", 4.435_101_626_46),
        ],
    ),
    (
        "swing-clears-tower",
        &[
            ("free_fall_distance", 0.5),
            ("speed_at_taut", 3.131_557_120_67),
            ("arrest_force_peak", 4_000.0),
            ("time_peak_force", 0.342_111_280_982),
            ("time_lowest", 0.721_257_390_1),
            ("time_first_slack", 0.476_643_053_5),
            ("swing_drop", 0.493_719_260_83),
            ("swing_speed_lowest", 3.292_847_566_34),
            ("deployed_length", 0.050_300_195_695_1),
            ("lowest_foot", 10.706_280_739_2),
            ("swing_offset_peak", 2.628_647_406_46),
            ("swing_angle_peak", 0.766_415_275_245),
            ("closest_approach.stair_tower", 0.521_352_593_538),
            ("margin.pipe_rack", 2.206_280_739_2),
        ],
    ),
    (
        "swing-strikes-column",
        &[
            ("free_fall_distance", 0.7),
            ("speed_at_taut", 3.705_308_354_24),
            ("arrest_force_peak", 3_600.0),
            ("time_lowest", 0.945_440_271_823),
            ("swing_drop", 1.090_856_608_42),
            ("swing_speed_lowest", 5.298_609_823_18),
            ("deployed_length", 0.053_134_364_141_3),
            ("strike_speed", 5.241_263_535_93),
            ("strike_drop_equivalent", 1.400_623_222_66),
            ("closest_approach.column", -1.957_137_393_22),
            ("swing_offset_peak", 4.307_137_393_22),
            ("lowest_foot", 5.909_143_391_58),
        ],
    ),
    (
        // k = 100 kg g / 0.02 / 5 m = 9806.65 N/m; undamped it would be 0.09 + sqrt(0.09^2 + 2 0.09 0.45) = 0.3884.
        "vertical-line-grab",
        &[
            ("free_fall_distance", 0.45),
            ("fall_factor", 0.09),
            ("arrest_force_peak", 3_479.205_869),
            ("time_peak_force", 0.466_286_156_7),
            ("arrest_distance", 0.352_876_136_435),
            ("time_lowest", 0.477_809_704_938),
            ("time_first_slack", 0.660_540_701_6),
            ("rebound_rise", 0.599_926_463_051),
            ("hang_travel", 0.09),
            ("lowest_foot", 16.897_123_863_6),
        ],
    ),
];

/// Lifelines against the exact cable, without knots: their law is a table within 0.1 % of the largest force.
///
/// The in-line absorber: undamped, so by energy, `m g (h + d + P/k) = T0 l + l^2 / 2 C + F s + P^2 / 2 k` with
/// `P = F (sin th1 + sin th2)`, solved by bisection; its instant by integration. Others: integration with the cable's
/// closed form; tension and sag from that closed form at the largest force.
pub const SPANS: &[Expected] = &[
    (
        // Followed to rest: the cable is longer by what its absorber has given.
        "lifeline-absorber-rebounds",
        &[
            ("free_fall_distance", 1.885_756_255_21),
            ("arrest_force_peak", 4_306.539_386),
            ("time_peak_force", 0.925_220_986),
            ("arrest_distance", 1.297_516_096_5),
            ("time_lowest", 0.925_796_608_6),
            ("rebound_rise", 0.340_333_831_4),
            ("time_first_slack", 1.037_250_986),
            ("slack_episodes", 6.0),
            ("settle_time", 5.020_650_986),
            ("span_deployed_length", 0.324_283_040_28),
            ("span_stroke_left", 0.475_716_959_72),
            ("span_stroke_used_up", 0.0),
            ("span_absorber_work", 2_594.264_322_2),
            ("span_tension_peak", 8_000.0),
            ("span_sag_peak", 1.347_351_272_7),
            ("other_elongation_peak", 1.211_595_017_5),
            ("line_work", 184.584_948_9),
            ("other_work", 168.461_491_7),
            ("hang_travel", 1.168_347_145_1),
        ],
    ),
    (
        "lifeline-inline-absorber",
        &[
            ("free_fall_distance", 1.3),
            ("arrest_force_peak", 3_501.462_885_84),
            ("anchor_force_peak", 9_000.0),
            ("span_tension_peak", 9_000.0),
            ("span_end_force", 9_000.0),
            ("span_sag_peak", 1.487_355_192_7),
            ("arrest_distance", 1.531_123_478_78),
            ("hang_travel", 1.390_826_332_66),
            ("time_lowest", 0.897_814_644_5),
        ],
    ),
    (
        "lifeline-two-workers",
        &[
            ("free_fall_distance", 2.5),
            ("arrest_force_peak", 3_500.0),
            ("time_peak_force", 0.825_182_097_543),
            ("span_tension_peak", 18_629.318_501_1),
            ("span_end_force", 18_629.318_501_1),
            ("anchor_force_peak", 18_629.318_501_1),
            ("span_sag_peak", 0.765_203_073_107),
            ("other_elongation_peak", 0.765_203_073_107),
            ("arrest_distance", 1.622_869_477_38),
            ("deployed_length", 0.807_666_404_274),
            ("time_lowest", 1.061_718_855_87),
            ("hang_travel", 1.287_644_115_14),
        ],
    ),
    (
        "lifeline-with-sag",
        &[
            ("free_fall_distance", 2.046_295_164_62),
            ("arrest_force_peak", 4_000.0),
            ("time_peak_force", 0.725_787_934_618),
            ("span_tension_peak", 15_187.733_808_9),
            ("span_sag_peak", 0.797_052_356_864),
            ("other_elongation_peak", 0.450_757_192_244),
            ("arrest_distance", 1.083_462_814_28),
            ("deployed_length", 0.566_038_955_37),
            ("time_lowest", 0.920_843_625_063),
            ("hang_travel", 0.785_581_843_167),
        ],
    ),
];
