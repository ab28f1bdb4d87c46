namespace PoleField.Cli.Tests.Doubles;

/// <summary>Case texts.</summary>
internal static class Cases
{
    /// <summary>The smallest sound case with iron, coil and rectangle.</summary>
    public const string Small = """
        format = 1
        title = "Small"

        [sketch]
        file = "poles.dxf"
        unit = "mm"

        [parts.RIDGE]
        material = "pure-iron"
        [parts.COIL]
        ampere_turns = 2500
        fill = 0.6

        [beam]
        centre = ["0 mm", "3.6 mm"]
        width = "3 mm"
        height = "0.3 mm"

        [magnet]
        length = "200 mm"

        """;

    /// <summary>Every section and key.</summary>
    public const string Whole = """
        format = 1
        title  = "Ridge and groove, wire half-spacing 3 mm"

        [sketch]
        file = "ridge-groove.dxf"       # relative to this file
        unit = "mm"
        join = "2 um"

        [parts.RIDGE]
        material = "pure-iron"
        [parts.YOKE]
        material = { file = "my-steel.csv" }
        [parts."COIL LEFT"]
        ampere_turns = 2500
        fill = 0.6
        [parts."COIL RIGHT"]
        ampere_turns = "-2.5 kA"
        fill = "60 %"
        [parts.MAGNET]
        remanence = "1.20 T"
        recoil_permeability = 1.05
        direction = 90
        [parts.SHIM]
        relative_permeability = 1000
        [parts.HOLE]
        material = "air"

        [surroundings]
        open = true
        applied_field = ["0 T", "2 G"]

        [symmetry]
        mirror = "left-right"

        [beam]
        centre = ["0 mm", "3.6 mm"]
        width  = "3 mm"
        height = "0.3 mm"

        [magnet]
        length = "200 mm"
        coil_temperature = "60 degC"
        stray_levels = ["3 mT", "5 G"]

        [accuracy]
        relative = 1e-5

        [require]
        gradient_min = "300 T/m"
        spread_max   = "2 %"
        iron_field_max = "1.9 T"

        [two_wire]
        half_spacing = "3 mm"
        midpoint = ["0 mm", "0 mm"]

        [ramp]
        factors = [0.1, 0.5, 1.0]
        onset = "2 %"

        [map]
        from = ["-4 mm", "2 mm"]
        to   = ["4 mm", "6 mm"]
        step = "0.05 mm"

        [tune]
        faces = ["RIDGE", { layer = "YOKE", from = ["-2 mm", "1 mm"], to = ["2 mm", "1 mm"] }]
        reach = "0.4 mm"
        freedoms = 12
        smallest_radius = "0.3 mm"
        goal = "field-times-gradient-spread"
        hold = { gradient = ">= 300 T/m", clearance = ">= 0.3 mm" }

        [tolerance]
        form = { size = "10 um", length = "2 mm" }
        place = { y = "20 um", z = "20 µm", turn = "0.5 mrad" }
        ampere_turns = "0.1 %"
        saturation = "1 %"
        beam_place = { y = "50 um", z = "50 um" }

        [flight]
        species = "K-39"
        source = { temperature = "478 K" }
        drift = "0.32 m"
        slit = { width = "4 mm", height = "0.1 mm" }

        """;
}
