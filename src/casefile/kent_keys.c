#include "kent_keys.h"
#include "kent_base.h"

#include <math.h>
#include <stdint.h>
#include <stdio.h>
#include <string.h>

#define NO_LIMIT             -INFINITY, INFINITY, false
#define WITHIN(least, most)  (least), (most), false
#define BETWEEN(least, most) (least), (most), true /* the least itself is refused */

/* One macro per kind of value, so that a row holds only what differs. */
#define QUANTITY(g, k, kind, range, fallback, says)                                    \
    {                                                                                  \
        g, k, KENT_VALUE_QUANTITY, kind, range, NULL, fallback, "0.1", says            \
    }
#define QUANTITY_OR(g, k, kind, range, word, fallback, says)                           \
    {                                                                                  \
        g, k, KENT_VALUE_QUANTITY, kind, range, word, fallback, "0.1", says            \
    }
#define EITHER(g, k, kind, range, fallback, says)                                      \
    {                                                                                  \
        g, k, KENT_VALUE_EITHER, kind, range, NULL, fallback, "0.1", says              \
    }
#define NUMBER(g, k, range, fallback, says)                                            \
    {                                                                                  \
        g, k, KENT_VALUE_NUMBER, KENT_RATIO, range, NULL, fallback, "0.1", says        \
    }
#define COUNT(g, k, range, fallback, says)                                             \
    {                                                                                  \
        g, k, KENT_VALUE_COUNT, KENT_RATIO, range, NULL, fallback, "0.1", says         \
    }
#define PLAIN(value, g, k, words, fallback, says)                                      \
    {                                                                                  \
        g, k, value, KENT_RATIO, NO_LIMIT, words, fallback, "0.1", says                \
    }
#define SWITCH(g, k, fallback, says)                                                   \
    PLAIN(KENT_VALUE_SWITCH, g, k, NULL, fallback, says)
#define TEXT(g, k, bytes, fallback, says)                                              \
    {                                                                                  \
        g, k, KENT_VALUE_TEXT, KENT_RATIO, 0.0, bytes, false, NULL, fallback, "0.1",   \
            says                                                                       \
    }
#define ID(g, k, fallback, says)      PLAIN(KENT_VALUE_ID, g, k, NULL, fallback, says)
#define REF(g, k, to, fallback, says) PLAIN(KENT_VALUE_REF, g, k, to, fallback, says)
#define WORD(g, k, words, fallback, says)                                              \
    PLAIN(KENT_VALUE_WORD, g, k, words, fallback, says)
#define LIST(g, k, of, fallback, says) PLAIN(KENT_VALUE_LIST, g, k, of, fallback, says)
#define GROUP(g, k, of, fallback, says)                                                \
    PLAIN(KENT_VALUE_GROUP, g, k, of, fallback, says)
#define STATION(g, k, fallback, says)                                                  \
    PLAIN(KENT_VALUE_STATION, g, k, NULL, fallback, says)
#define TURN(g, k, fallback, says) PLAIN(KENT_VALUE_TURN, g, k, NULL, fallback, says)
#define VECTOR(g, k, fallback, says)                                                   \
    PLAIN(KENT_VALUE_VECTOR, g, k, NULL, fallback, says)
#define NEXT_TO(g)                                                                     \
    REF(g, "next_to", "point", "delivery side of a pump or valve with flow_to",        \
        "next point on its side of a device in line")
#define CONNECTION(g)                                                                  \
    QUANTITY(g, "connection_diameter", KENT_DIAMETER, BETWEEN(0.0, 20.0), "required",  \
             "bore of its connection, which its losses refer to")
#define CAPACITY(g)                                                                    \
    NUMBER(g, "loss", BETWEEN(0.0, 1e9), "one of loss, kv and cv",                     \
           "K at full opening"),                                                       \
        NUMBER(g, "kv", BETWEEN(0.0, 1e8), "none",                                     \
               "m3/h at 1 bar at full opening, in place of loss"),                     \
        NUMBER(g, "cv", BETWEEN(0.0, 1e8), "none",                                     \
               "US gallon/min at 1 psi at full opening, in place of loss")

#define SOIL_VALUES(g, bearing)                                                        \
    QUANTITY(g, "allowable_bearing", KENT_STRESS, WITHIN(0.0, 5e7), bearing,           \
             "allowable horizontal bearing; 0: none can be relied on"),                \
        LIST(g, "bearing_by_depth", "", "none",                                        \
             "pairs (depth of the face's centre, bearing), in place of "               \
             "allowable_bearing"),                                                     \
        QUANTITY(g, "bearing_gradient", KENT_UNIT_WEIGHT, BETWEEN(0.0, 1e6), "none",   \
                 "bearing per depth, in place of allowable_bearing"),                  \
        NUMBER(g, "passive_share", BETWEEN(0.0, 1.0), "none",                          \
               "share of the passive earth pressure that a block may count on, in "    \
               "place of allowable_bearing"),                                          \
        NUMBER(g, "factor_inside", WITHIN(1.0, 10.0), "1.0",                           \
               "safety factor already inside the bearing"),                            \
        QUANTITY(g, "vertical_bearing", KENT_STRESS, WITHIN(0.0, 5e7),                 \
                 "allowable_bearing", "allowable bearing under a base"),               \
        NUMBER(g, "base_friction", WITHIN(0.0, 1.5), "none",                           \
               "coefficient of friction, concrete on soil"),                           \
        QUANTITY(g, "unit_weight", KENT_UNIT_WEIGHT, WITHIN(5e3, 3e4), "none",         \
                 "weight of the soil in place"),                                       \
        QUANTITY(g, "friction_angle", KENT_ANGLE, WITHIN(0.0, 0.95993108859688127),    \
                 "none", "angle of internal friction"),                                \
        QUANTITY(g, "cohesion", KENT_STRESS, WITHIN(0.0, 1e6), "none", "cohesion"),    \
        NUMBER(g, "friction_ratio", WITHIN(0.0, 1.0), "none",                          \
               "pipe-to-soil friction angle over friction angle (restrained length)"), \
        NUMBER(g, "adhesion_ratio", WITHIN(0.0, 1.0), "none",                          \
               "pipe-to-soil adhesion over cohesion (restrained length)"),             \
        NUMBER(g, "passive_ratio", WITHIN(0.0, 1.0), "none",                           \
               "share of the passive pressure mobilised (restrained length)"),         \
        LIST(g, "passive_ratios", "", "none",                                          \
             "pairs (trench, passive_ratio), where it depends on the trench"),         \
        QUANTITY(g, "base_cohesion", KENT_STRESS, WITHIN(0.0, 1e6), "none",            \
                 "adhesion of concrete on soil, in place of base_friction"),           \
        QUANTITY(g, "wall_friction", KENT_ANGLE, WITHIN(0.0, 0.95993108859688127),     \
                 "none",                                                               \
                 "angle of friction between soil and a block's face: Coulomb's "       \
                 "passive pressure in place of Rankine's"),                            \
        WORD(g, "bearing_route", "presumptive|by-depth|per-depth|passive",             \
             "the one that is given",                                                  \
             "which bearing decides where several are given; the others are shown "    \
             "beside it"),                                                             \
        WORD(g, "nature", "natural|fill|organic|expansive|liquefiable|collapsible",    \
             "natural", "what the ground is; all but natural is unreliable"),          \
        SWITCH(g, "unreliable", "false, but of a nature other than natural true",      \
               "no restraint may count on it; false: it has been made good")

#define BLOCK_POLICIES "allowed|forbidden|old-mains-only|with-joints"

/* left_out: what holds where one that every set has is left out; unasked: the same of
 * one whose 0 means that nothing is asked. */
#define RULE_VALUES(g, left_out, unasked)                                              \
    NUMBER(g, "safety_factor", WITHIN(1.0, 10.0), left_out,                            \
           "factor on the thrust where a case states none of its own"),                \
        NUMBER(g, "factor_test", WITHIN(1.0, 10.0), "safety_factor",                   \
               "factor in place of safety_factor under the site test"),                \
        NUMBER(g, "height_to_depth", BETWEEN(0.0, 1.0), left_out,                      \
               "most height of a block over the depth of its base"),                   \
        NUMBER(g, "width_to_height_least", WITHIN(0.1, 10.0), left_out,                \
               "least width of a block over its height"),                              \
        NUMBER(g, "width_to_height_most", WITHIN(0.1, 20.0), left_out,                 \
               "most width of a block over its height"),                               \
        QUANTITY(g, "least_thickness", KENT_LENGTH, BETWEEN(0.0, 10.0), left_out,      \
                 "least thickness of a block"),                                        \
        QUANTITY(g, "least_height", KENT_LENGTH, BETWEEN(0.0, 10.0), left_out,         \
                 "least height of a block"),                                           \
        QUANTITY(g, "side_step", KENT_LENGTH, BETWEEN(0.0, 1.0), left_out,             \
                 "sides are rounded up to multiples of it"),                           \
        QUANTITY(g, "least_cover", KENT_LENGTH, WITHIN(0.0, 10.0), left_out,           \
                 "no bearing block where the pipe has less cover"),                    \
        QUANTITY(g, "concrete_unit_weight", KENT_UNIT_WEIGHT, WITHIN(1.5e4, 4e4),      \
                 left_out, "weight of concrete"),                                      \
        QUANTITY(g, "water_unit_weight", KENT_UNIT_WEIGHT, WITHIN(9e3, 1.1e4),         \
                 left_out, "weight of ground water"),                                  \
        NUMBER(g, "wrapped_ratio", BETWEEN(0.0, 1.0), left_out,                        \
               "friction of a sleeved pipe over that of a bare one"),                  \
        QUANTITY(g, "largest_volume", KENT_VOLUME, BETWEEN(0.0, 1e4), left_out,        \
                 "a block larger than this is refused"),                               \
        WORD(g, "blocks", BLOCK_POLICIES, unasked,                                     \
             "whether blocks may be built: never, only where a new main joins an old " \
             "one, or only together with restrained joints"),                          \
        WORD(g, "vertical_blocks", BLOCK_POLICIES, unasked,                            \
             "the same under an upward thrust"),                                       \
        QUANTITY(g, "largest_thrust", KENT_FORCE, WITHIN(0.0, 1e9), unasked,           \
                 "factored thrust beyond which the concrete itself has to be "         \
                 "designed"),                                                          \
        QUANTITY(g, "height_over_diameter", KENT_LENGTH, WITHIN(0.0, 10.0), unasked,   \
                 "a block is taller than the pipe's outside diameter by so much"),     \
        QUANTITY(g, "concrete_behind", KENT_LENGTH, WITHIN(0.0, 10.0), unasked,        \
                 "least concrete between fitting and face"),                           \
        QUANTITY(g, "large_diameter", KENT_DIAMETER, WITHIN(0.0, 20.0), unasked,       \
                 "outside diameter from which large_least_cover holds"),               \
        QUANTITY(g, "large_least_cover", KENT_LENGTH, WITHIN(0.0, 10.0), unasked,      \
                 "least_cover from large_diameter on"),                                \
        QUANTITY(g, "steepest_ground", KENT_ANGLE, WITHIN(0.0, 1.5707963267948966),    \
                 unasked, "no block before ground that falls more steeply"),           \
        NUMBER(g, "steepest_pipe", WITHIN(0.0, 10.0), unasked,                         \
               "rise over run beyond which a main is anchored against its slope"),     \
        SWITCH(g, "soil_above", unasked,                                               \
               "the prism of soil above a gravity block counts as weight"),            \
        WORD(g, "spread", "45-degrees|plain-concrete", unasked,                        \
             "how far thrust spreads inside a block: within 45 degrees, or as far as " \
             "plain concrete bends and shears"),                                       \
        WORD(g, "concrete_code", "EN1992|ACI318", unasked,                             \
             "code that plain concrete is checked by"),                                \
        QUANTITY(g, "strength_before_test", KENT_STRENGTH, WITHIN(0.0, 1e8), unasked,  \
                 "strength that the concrete must have before the site test"),         \
        QUANTITY(g, "least_age", KENT_TIME, WITHIN(0.0, 1e8), unasked,                 \
                 "time from casting to the site test"),                                \
        NUMBER(g, "factor_sliding", WITHIN(0.0, 10.0), unasked,                        \
               "factor asked of a block against sliding"),                             \
        NUMBER(g, "factor_overturning", WITHIN(0.0, 10.0), unasked,                    \
               "factor asked of a block against overturning"),                         \
        NUMBER(g, "factor_flotation", WITHIN(0.0, 10.0), unasked,                      \
               "factor asked of a block and its pipe against floating"),               \
        NUMBER(g, "factor_stability_test", WITHIN(0.0, 10.0), unasked,                 \
               "factor in place of the first two under the site test"),                \
        QUANTITY(g, "strap_stress", KENT_STRENGTH, WITHIN(0.0, 1e9), unasked,          \
                 "stress that straps and rods may be pulled to"),                      \
        QUANTITY(g, "strap_bond", KENT_STRENGTH, WITHIN(0.0, 1e8), unasked,            \
                 "bond between a rod and concrete"),                                   \
        QUANTITY(g, "strap_diameter", KENT_DIAMETER, WITHIN(0.0, 0.1), unasked,        \
                 "least diameter of a strap's rod"),                                   \
        WORD(g, "length_form", "handbook|ETL-1110-3-446", unasked,                     \
             "published form that restrained lengths are taken from"),                 \
        NUMBER(g, "run_share", WITHIN(0.0, 1.0), unasked,                              \
               "share of the bearing of a tee's restrained run that counts")

#define PROVENANCE(g)                                                                  \
    TEXT(g, "source", 199, "required", "where the values come from"),                  \
        WORD(g, "status", "seen|memory|derived|common practice", "required",           \
             "how far the values can be trusted")

#define JOINTS   "push-on|mechanical|flanged|welded|fused|restrained"
#define TRENCHES "type-1|type-2|type-3|type-4|type-5"
#define AREAS    "outside|inside|nominal"
#define SUPPORTS "flexible-joints|fixed-upstream|fixed-throughout"

const kent_key KENT_KEYS[] = {
    /* ---- a case --------------------------------------------------------------- */
    COUNT("case", "format", WITHIN(1.0, 1.0), "required", "version of this format"),
    TEXT("case", "title", 159, "the file's name", "what the main is called on sheets"),
    WORD("case", "units", "SI|US", "SI", "units of what is displayed"),
    GROUP("case", "project", "project", "none", "numbers and names for the sheets"),
    GROUP("case", "water", "water", "none", "properties of the water"),
    GROUP("case", "site", "site", "none", "altitude and gravity"),
    LIST("case", "points", "point", "none", "survey points of the main"),
    LIST("case", "pipes", "pipe", "none", "pipes, each along a route of points"),
    LIST("case", "fixed_levels", "fixed_level", "none", "reservoirs: levels that hold"),
    LIST("case", "outflows", "outflow", "none", "flows drawn from the main"),
    LIST("case", "valves", "valve", "none", "valves, in line or discharging"),
    LIST("case", "scenarios", "scenario", "none",
         "what happens, each from steady flow"),
    LIST("case", "soils", "soil", "none", "soils of the site"),
    GROUP("case", "ground", "ground", "none", "ground where a point says nothing else"),
    LIST("case", "fittings", "fitting", "none",
         "refines fittings found from geometry, or states one by its ports"),
    LIST("case", "as_built", "as_built", "none",
         "what was built, for the factor that it reaches"),
    GROUP("case", "concrete", "concrete", "none", "concrete of the blocks"),
    GROUP("case", "loads", "loads", "none", "test, static level and factors"),
    GROUP("case", "limits", "limits", "none",
          "what is asked of pressures beyond the ratings of pipes and fittings"),
    GROUP("case", "solver", "solver", "none", "how the surge is computed"),
    GROUP("case", "design_rules", "design_rules", "none", "rules of block design"),
    LIST("case", "pumps", "pump", "none", "pumps, in line or from a level"),
    LIST("case", "check_valves", "check_valve", "none", "check valves, in line"),
    LIST("case", "surge_tanks", "surge_tank", "none", "open surge tanks"),
    LIST("case", "one_way_surge_tanks", "one_way_surge_tank", "none",
         "surge tanks that only feed the main"),
    LIST("case", "air_vessels", "air_vessel", "none", "air vessels"),
    LIST("case", "relief_valves", "relief_valve", "none",
         "relief and surge-anticipating valves"),
    LIST("case", "air_valves", "air_valve", "none", "air valves"),
    LIST("case", "control_valves", "control_valve", "none",
         "valves that hold a pressure, in line"),
    LIST("case", "states", "state", "one, \"normal\"", "steady flows to start from"),
    LIST("case", "ground_zones", "ground_zone", "none",
         "ground by stretches of a pipe"),
    TEXT("case", "points_file", 255, "none", "points from a table (CSV)"),
    TEXT("case", "pipes_file", 255, "none", "pipes from a table (CSV)"),
    GROUP("case", "tables", "tables", "none", "how tables are written"),

    WORD("tables", "decimal", "point|comma", "point", "decimal sign of numbers"),
    WORD("tables", "separator", "comma|semicolon|tab", "comma",
         "what stands between cells"),

    TEXT("project", "number", 63, "none", "project number"),
    TEXT("project", "drawing", 63, "none", "drawing number"),
    TEXT("project", "revision", 63, "none", "revision"),
    TEXT("project", "designer", 63, "none", "who designed"),
    TEXT("project", "checker", 63, "none", "who checked"),
    TEXT("project", "utility", 63, "none", "whose main it is"),
    TEXT("project", "codes", 239, "none",
         "standards, with editions, that prevail here; printed, not checked"),
    TEXT("project", "date", 31, "none", "date of the design"),

    QUANTITY("water", "temperature", KENT_TEMPERATURE, WITHIN(273.15, 373.15),
             "15 degC", "gives every property that is not stated"),
    QUANTITY("water", "density", KENT_DENSITY, WITHIN(500.0, 2000.0),
             "from temperature", "density"),
    QUANTITY("water", "bulk_modulus", KENT_MODULUS, WITHIN(1e8, 1e10),
             "from temperature", "adiabatic bulk modulus"),
    QUANTITY("water", "viscosity", KENT_VISCOSITY, WITHIN(1e-5, 1.0),
             "from temperature", "dynamic viscosity"),
    QUANTITY("water", "vapour_pressure", KENT_PRESSURE, WITHIN(0.0, 1.1e5),
             "from temperature", "vapour pressure, absolute"),
    NUMBER("water", "gas_content", WITHIN(0.0, 0.05), "0.0",
           "free gas by volume at one atmosphere"),

    QUANTITY("site", "altitude", KENT_LENGTH, WITHIN(-500.0, 11000.0), "0 m",
             "gives the barometric pressure"),
    QUANTITY("site", "gravity", KENT_ACCELERATION, WITHIN(9.0, 10.0), "9.80665 m/s^2",
             "acceleration of gravity"),
    WORD("site", "station_style", "km+m|100m+m|100ft+ft", "km+m, in US units 100ft+ft",
         "what \"1+198\" means"),

    ID("point", "id", "required", "its name"),
    QUANTITY("point", "x", KENT_LENGTH, WITHIN(-1e8, 1e8), "none", "east"),
    QUANTITY("point", "y", KENT_LENGTH, WITHIN(-1e8, 1e8), "none", "north"),
    QUANTITY("point", "z", KENT_LENGTH, WITHIN(-1000.0, 9000.0), "required",
             "level of the pipe's centre line"),
    QUANTITY("point", "cover", KENT_LENGTH, WITHIN(0.0, 100.0), "the ground's",
             "ground to crown of the pipe"),
    QUANTITY("point", "ground_level", KENT_LENGTH, WITHIN(-1000.0, 9000.0), "none",
             "level of the ground, in place of cover"),
    QUANTITY_OR("point", "water_table", KENT_LENGTH, WITHIN(0.0, 1000.0), "none",
                "the ground's", "depth of ground water below ground"),
    STATION("point", "station", "along the route", "its station"),
    STATION("point", "station_ahead", "none",
            "station equation: the station that counting goes on from"),
    TURN("point", "turn", "from coordinates",
         "turn in plan, as \"45 deg right\", where there are no x and y"),
    QUANTITY("point", "curve_radius", KENT_LENGTH, BETWEEN(0.0, 1e5), "none",
             "radius of the arc that the pipe follows past this point"),
    REF("point", "soil", "soil", "the ground's", "soil around it"),
    SWITCH("point", "record", "false", "keep its history"),

    ID("pipe", "id", "required", "its name"),
    LIST("pipe", "route", "", "required",
         "ids of the points it runs through, in order"),
    REF("pipe", "pipe_class", "pipe_class", "none", "row of the catalogue of pipes"),
    REF("pipe", "material", "material", "the class's",
        "row of the catalogue of materials"),
    QUANTITY("pipe", "outside_diameter", KENT_DIAMETER, BETWEEN(0.0, 20.0),
             "the class's", "outside diameter"),
    QUANTITY("pipe", "inside_diameter", KENT_DIAMETER, BETWEEN(0.0, 20.0),
             "outside - 2 wall - 2 lining", "diameter inside the lining"),
    QUANTITY("pipe", "wall_thickness", KENT_DIAMETER, BETWEEN(0.0, 2.0), "the class's",
             "nominal thickness of the structural wall"),
    QUANTITY("pipe", "lining_thickness", KENT_DIAMETER, WITHIN(0.0, 0.5),
             "the class's, else 0 mm", "thickness of the lining"),
    QUANTITY("pipe", "elastic_modulus", KENT_MODULUS, WITHIN(1e7, 1e12),
             "the material's", "modulus of the wall"),
    NUMBER("pipe", "poisson_ratio", WITHIN(0.0, 0.5), "the material's",
           "Poisson's ratio of the wall"),
    QUANTITY("pipe", "roughness", KENT_DIAMETER, WITHIN(0.0, 0.1), "the material's",
             "equivalent sand roughness (Colebrook-White)"),
    NUMBER("pipe", "hazen_williams_c", WITHIN(10.0, 200.0), "none",
           "Hazen-Williams coefficient, in place of roughness"),
    NUMBER("pipe", "manning_n", WITHIN(0.001, 0.1), "none",
           "Manning's n in s/m^(1/3), in place of roughness"),
    NUMBER("pipe", "friction_factor", WITHIN(0.0, 1.0), "none",
           "fixed Darcy factor, in place of roughness"),
    QUANTITY("pipe", "length", KENT_LENGTH, BETWEEN(0.0, 1e6), "from coordinates",
             "length for the hydraulics"),
    QUANTITY("pipe", "wave_speed", KENT_SPEED, WITHIN(10.0, 2000.0), "computed",
             "speed of a pressure wave"),
    WORD("pipe", "axial_support", SUPPORTS, "by the joint",
         "how the pipe is held lengthwise, for the wave speed"),
    WORD("pipe", "wall_theory", "thick|thin", "thick",
         "form of the wave speed formula"),
    WORD("pipe", "joint", JOINTS, "push-on", "kind of joint"),
    QUANTITY("pipe", "joint_deflection", KENT_ANGLE, WITHIN(0.0, 0.26179938779914941),
             "0 deg", "turn that a joint may take without a fitting"),
    QUANTITY("pipe", "pipe_length", KENT_LENGTH, BETWEEN(0.0, 100.0), "none",
             "laying length of one pipe; restrained lengths are rounded up to it"),
    NUMBER("pipe", "loss", WITHIN(0.0, 1e6), "0.0",
           "minor losses spread along it, K on its bore"),
    QUANTITY("pipe", "pressure_rating", KENT_PRESSURE, WITHIN(1e3, 1e9), "the class's",
             "pressure the pipe is rated for, in place of all of its class's ratings"),
    QUANTITY("pipe", "surge_rating", KENT_PRESSURE, WITHIN(1e3, 1e9), "the class's",
             "pressure it is rated for with surge"),
    QUANTITY("pipe", "recurring_rating", KENT_PRESSURE, WITHIN(1e3, 1e9), "the class's",
             "the same in scenarios of class recurring; else surge_rating, but of a "
             "plastic pressure_rating"),
    QUANTITY("pipe", "test_rating", KENT_PRESSURE, WITHIN(1e3, 1e9), "the class's",
             "pressure it is rated for under test"),
    QUANTITY("pipe", "joint_rating", KENT_PRESSURE, WITHIN(1e3, 1e9), "none",
             "pressure that its joints are rated for, in every case"),
    TEXT("pipe", "standard", 95, "the class's",
         "standard and edition that its ratings are by"),
    TURN("pipe", "branch_turn", "from coordinates",
         "turn from the pipe that runs at its first point, where there are no x and y"),
    SWITCH("pipe", "above_ground", "false", "it lies on supports: no ground holds it"),
    QUANTITY("pipe", "nominal_size", KENT_DIAMETER, BETWEEN(0.0, 20.0), "the class's",
             "size it is called by, of thrust_area \"nominal\""),
    QUANTITY("pipe", "expansion", KENT_EXPANSION, WITHIN(0.0, 1e-3), "the material's",
             "thermal expansion of its length"),
    QUANTITY("pipe", "long_modulus", KENT_MODULUS, WITHIN(1e7, 1e12), "the material's",
             "modulus of a plastic under lasting load"),
    LIST("pipe", "creep", "", "the material's",
         "pairs (retardation time, compliance) of a plastic wall"),

    REF("fixed_level", "at", "point", "required", "point where it stands"),
    QUANTITY("fixed_level", "level", KENT_LENGTH, WITHIN(-1000.0, 9000.0), "required",
             "water level"),
    NUMBER("fixed_level", "loss", WITHIN(0.0, 1e6), "0.0",
           "loss K on the pipe's bore of flow out of it"),

    REF("outflow", "at", "point", "required", "point where it is drawn"),
    QUANTITY("outflow", "flow", KENT_FLOW, WITHIN(-1000.0, 1000.0), "required",
             "flow out of the main; negative: into it"),
    SWITCH("outflow", "pressure_dependent", "false", "flow falls with the pressure"),
    QUANTITY("outflow", "full_pressure", KENT_PRESSURE, BETWEEN(0.0, 1e8), "none",
             "pressure at which the whole flow is drawn, if pressure_dependent"),

    ID("valve", "id", "required", "its name"),
    REF("valve", "at", "point", "required", "point where it stands"),
    REF("valve", "type", "valve_type", "linear if no characteristic",
        "row of the catalogue of valves, or \"linear\""),
    QUANTITY("valve", "size", KENT_DIAMETER, BETWEEN(0.0, 20.0), "required",
             "nominal bore, which loss refers to"),
    NUMBER("valve", "loss", BETWEEN(0.0, 1e9), "the type's", "K at full opening"),
    NUMBER("valve", "kv", BETWEEN(0.0, 1e8), "none",
           "m3/h at 1 bar at full opening, in place of loss"),
    NUMBER("valve", "cv", BETWEEN(0.0, 1e8), "none",
           "US gallon/min at 1 psi at full opening, in place of loss"),
    QUANTITY("valve", "flow", KENT_FLOW, BETWEEN(0.0, 1000.0), "none",
             "flow it passes in the first state, in place of loss"),
    LIST("valve", "characteristic", "", "the type's",
         "pairs (opening, K), at least two, in place of type"),
    NUMBER("valve", "opening", WITHIN(0.0, 1.0), "1.0", "opening in the steady state"),
    QUANTITY("valve", "discharge_level", KENT_LENGTH, WITHIN(-1000.0, 9000.0), "none",
             "level it discharges to, at the end of a pipe"),

    ID("scenario", "id", "required", "its name, also in file names"),
    TEXT("scenario", "title", 159, "its id", "what happens, for people"),
    QUANTITY("scenario", "duration", KENT_TIME, BETWEEN(0.0, 1e6),
             "that of same_as, else it has to be given", "time simulated"),
    WORD("scenario", "class", "recurring|occasional|exceptional",
         "that of same_as, else occasional",
         "how often it may happen, for its factor and the rating it is held against"),
    LIST("scenario", "events", "event", "none", "what moves, and when"),
    LIST("scenario", "states", "", "those of same_as, else all",
         "ids of the states it starts from"),
    LIST("scenario", "without", "", "none",
         "ids of devices beside the main that it leaves out"),
    REF("scenario", "same_as", "scenario", "none",
        "scenario whose events it repeats, to be set beside it"),
    SWITCH("scenario", "for_comparison", "false",
           "it decides no load case and no limit"),
    NUMBER("scenario", "cycles_per_day", BETWEEN(0.0, 1e5), "none",
           "times a day that it happens, of class recurring"),

    REF("event", "valve", "valve", "none", "valve that moves"),
    REF("event", "outflow", "outflow", "none", "point of the outflow that changes"),
    QUANTITY("event", "start_time", KENT_TIME, WITHIN(0.0, 1e6), "0 s",
             "when the change starts"),
    QUANTITY("event", "ramp_time", KENT_TIME, WITHIN(0.0, 1e6), "none",
             "time the change takes"),
    EITHER("event", "to", KENT_FLOW, WITHIN(0.0, 1.5), "none",
           "opening or share of the rated speed (a number), or flow (with unit) at the "
           "end of the change"),
    LIST("event", "opening_law", "", "none",
         "pairs (time from start_time, opening), in place of ramp_time and to"),
    LIST("event", "flow_law", "", "none",
         "pairs (time from start_time, flow) of an outflow, in place of ramp_time and "
         "to"),
    REF("event", "pump", "pump", "none", "pump whose units change"),
    WORD("event", "action", "trip|start|stop|ramp", "none",
         "of a pump: power is lost; from or to standstill, or to a share of its speed, "
         "in ramp_time"),
    COUNT("event", "how_many", WITHIN(1.0, 20.0), "all", "units concerned"),
    REF("event", "fixed_level", "fixed_level", "none",
        "point of the fixed level that changes"),
    LIST("event", "level_law", "", "none",
         "pairs (time from start_time, level) of a fixed level"),
    QUANTITY("event", "period", KENT_TIME, BETWEEN(0.0, 1e6), "none",
             "time after which a law begins again"),
    REF("event", "burst", "point", "none", "point where the pipe bursts"),
    QUANTITY("event", "area", KENT_AREA, BETWEEN(0.0, 100.0), "none",
             "of the burst, at the end of ramp_time"),
    NUMBER("event", "coefficient", BETWEEN(0.0, 1.0), "0.6",
           "of discharge, of a burst"),

    ID("soil", "id", "required", "its name"),
    REF("soil", "from", "soil_row", "none",
        "row of the catalogue of soils whose values hold where none is given here"),
    TEXT("soil", "source", 199, "given in the case", "report the values come from"),
    SOIL_VALUES("soil", "one of the four bearings, or from"),

    REF("ground", "soil", "soil", "none", "soil around the main"),
    QUANTITY("ground", "cover", KENT_LENGTH, WITHIN(0.0, 100.0), "none",
             "ground to crown of the pipe"),
    QUANTITY_OR("ground", "water_table", KENT_LENGTH, WITHIN(0.0, 1000.0), "none",
                "none", "depth of ground water below ground"),
    SWITCH("ground", "wrapped", "false", "pipes are in polyethylene sleeves"),
    WORD("ground", "trench", TRENCHES, "none", "kind of trench (AWWA C150)"),
    REF("ground", "backfill", "soil", "as the ground",
        "soil that the trench is filled with: it rubs on the pipe, the ground bears"),

    REF("fitting", "at", "point", "none", "point of a fitting found from geometry"),
    ID("fitting", "id", "none", "name of a fitting stated by its ports"),
    WORD("fitting", "type",
         "bend|tee|wye|cross|reducer|dead-end|valve|straight|tapping-tee|hydrant|"
         "air-valve-tee|washout-tee|manhole-tee|wall-piece|flange-adaptor",
         "from geometry", "kind of fitting"),
    QUANTITY("fitting", "angle", KENT_ANGLE, WITHIN(0.0, 3.1415926535897931),
             "from geometry", "turn of a bend, angle of a branch"),
    WORD("fitting", "orientation", "horizontal|crest|sag", "from geometry",
         "which way a bend turns, in schematic cases"),
    WORD("fitting", "restraint",
         "thrust-block|anchor-block|restrained-joints|block-and-joints|none",
         "by its type", "how it is held"),
    REF("fitting", "soil", "soil", "the point's", "soil around it"),
    QUANTITY("fitting", "cover", KENT_LENGTH, WITHIN(0.0, 100.0), "the point's",
             "ground to crown of the pipe"),
    QUANTITY("fitting", "weight", KENT_FORCE, WITHIN(0.0, 1e8), "0 N",
             "weight of fitting and water in it, counted in the balance"),
    QUANTITY("fitting", "face", KENT_LENGTH, WITHIN(0.0, 100.0), "0 m",
             "centre to the face of every port"),
    QUANTITY("fitting", "rating", KENT_PRESSURE, WITHIN(1e3, 1e9), "none",
             "pressure that its own parts, as flanges, are rated for"),
    QUANTITY("fitting", "surge_rating", KENT_PRESSURE, WITHIN(1e3, 1e9), "rating",
             "the same with surge"),
    QUANTITY("fitting", "test_rating", KENT_PRESSURE, WITHIN(1e3, 1e9), "rating",
             "the same under test"),
    TEXT("fitting", "standard", 95, "none",
         "standard and edition that its rating is by"),
    LIST("fitting", "ports", "port", "none", "ports of a fitting without a network"),
    GROUP("fitting", "branch", "branch", "none", "a branch without a pipe"),
    LIST("fitting", "together_with", "", "none",
         "ids of points whose fittings are held as one with this"),
    SWITCH("fitting", "apart", "false", "never made part of a group unasked"),
    LIST("fitting", "obstacles", "obstacle", "none",
         "what lies near, that the soil behind a block may not count on"),
    GROUP("fitting", "ground_slope", "ground_slope", "level ground",
          "how the ground falls away from it"),
    WORD("fitting", "backing", "natural|compacted-fill", "natural",
         "what a block's face stands against"),
    NUMBER("fitting", "block_share", BETWEEN(0.0, 1.0), "none",
           "share of the thrust that the block takes, of restraint "
           "\"block-and-joints\""),
    LIST("fitting", "run_restrained", "", "none",
         "pairs (next point along the run, length restrained) of a tee"),
    QUANTITY("fitting", "contact_area", KENT_AREA, BETWEEN(0.0, 100.0), "none",
             "on which the fitting presses on its block"),
    LIST("fitting", "can_close", "", "of a cross or wye every leg, else none",
         "next points of the legs that can be shut"),
    TEXT("fitting", "reason", 159, "none", "why it is restrained as it is"),
    TEXT("fitting", "sheet", 31, "none", "sheet of the drawings that shows it"),

    VECTOR("ground_slope", "direction", "required", "downhill: east, north, up"),
    QUANTITY("ground_slope", "angle", KENT_ANGLE, WITHIN(0.0, 1.5707963267948966),
             "required", "how steeply it falls, below the level"),

    VECTOR("port", "direction", "required", "out of the fitting: east, north, up"),
    QUANTITY("port", "pressure", KENT_PRESSURE, WITHIN(-1.2e5, 1e9), "required",
             "pressure, gauge"),
    QUANTITY("port", "flow", KENT_FLOW, WITHIN(-1000.0, 1000.0), "0 m^3/s",
             "flow out of the fitting"),
    QUANTITY("port", "inside_diameter", KENT_DIAMETER, BETWEEN(0.0, 20.0), "required",
             "of the stream"),
    QUANTITY("port", "outside_diameter", KENT_DIAMETER, BETWEEN(0.0, 20.0), "none",
             "of the pipe"),
    QUANTITY("port", "seal_diameter", KENT_DIAMETER, BETWEEN(0.0, 20.0),
             "outside_diameter, else inside_diameter", "on which the pressure acts"),
    NUMBER("port", "momentum_factor", WITHIN(1.0, 2.0), "computed",
           "momentum of the stream over that of its mean speed"),
    QUANTITY("port", "face", KENT_LENGTH, WITHIN(0.0, 100.0), "the fitting's",
             "centre to face"),

    QUANTITY("loads", "test_pressure", KENT_PRESSURE, WITHIN(1e3, 1e9), "none",
             "pressure of the site test at test_gauge_at"),
    REF("loads", "test_gauge_at", "point", "none", "point where test pressure is read"),
    QUANTITY("loads", "static_level", KENT_LENGTH, WITHIN(-1000.0, 9000.0),
             "highest fixed level", "level of still water"),
    NUMBER("loads", "safety_factor", WITHIN(1.0, 10.0), "the design rules'",
           "factor on every thrust"),
    GROUP("loads", "factors", "factors", "none", "factors by load case"),
    WORD("loads", "test_rule",
         "EN805-surge-calculated|EN805-surge-assumed|C600|working-factor", "none",
         "rule that gives the test pressure, in place of test_pressure"),
    NUMBER("loads", "test_factor", WITHIN(1.0, 5.0), "1.5",
           "factor on the working pressure, of test_rule \"working-factor\""),
    QUANTITY("loads", "surge_allowance", KENT_PRESSURE, WITHIN(2e5, 1e8), "2 bar",
             "surge taken in, of test_rule \"EN805-surge-assumed\""),
    QUANTITY("loads", "future_pressure", KENT_PRESSURE, WITHIN(0.0, 1e9), "none",
             "pressure expected later at future_gauge_at"),
    REF("loads", "future_gauge_at", "point", "none",
        "point where future_pressure is read"),

    GROUP("loads", "bearing_increase", "bearing_increase", "none",
          "factors on what soil may bear, by load case"),
    WORD("loads", "thrust_area", AREAS, "outside",
         "diameter that the pressure of a leg acts on: outside, as the seal, bore, or "
         "the size its class is called by"),
    QUANTITY("loads", "cooling", KENT_WARMING, WITHIN(0.0, 100.0), "none",
             "that a fused or welded main may cool below its temperature when closed"),
    LIST("loads", "waived", "", "none",
         "pairs (test, static, shut-off or surge, reason): load cases done without"),

    NUMBER("bearing_increase", "test", WITHIN(1.0, 3.0), "1.0", "site test"),
    NUMBER("bearing_increase", "static", WITHIN(1.0, 3.0), "1.0", "still water"),
    NUMBER("bearing_increase", "steady", WITHIN(1.0, 3.0), "1.0", "steady flow"),
    NUMBER("bearing_increase", "shut_off", WITHIN(1.0, 3.0), "1.0", "pump shut-off"),
    NUMBER("bearing_increase", "recurring", WITHIN(1.0, 3.0), "1.0",
           "scenarios of class recurring"),
    NUMBER("bearing_increase", "occasional", WITHIN(1.0, 3.0), "1.0",
           "scenarios of class occasional"),
    NUMBER("bearing_increase", "exceptional", WITHIN(1.0, 3.0), "1.0",
           "scenarios of class exceptional"),
    NUMBER("bearing_increase", "suction", WITHIN(1.0, 3.0), "1.0",
           "lowest pressure, which pulls inwards"),

    QUANTITY("limits", "lowest_steady", KENT_PRESSURE, WITHIN(-1.1e5, 1e8), "none",
             "pressure, gauge, that steady flow may not fall below"),
    QUANTITY("limits", "lowest_recurring", KENT_PRESSURE, WITHIN(-1.1e5, 1e8), "none",
             "the same of scenarios of class recurring"),
    QUANTITY("limits", "lowest_occasional", KENT_PRESSURE, WITHIN(-1.1e5, 1e8), "none",
             "the same of scenarios of class occasional"),
    QUANTITY("limits", "lowest_exceptional", KENT_PRESSURE, WITHIN(-1.1e5, 1e8), "none",
             "the same of scenarios of class exceptional"),
    QUANTITY("limits", "life", KENT_TIME, BETWEEN(0.0, 1e10), "none",
             "time that the main is to serve, for counting swings"),

    NUMBER("factors", "test", WITHIN(1.0, 10.0), "safety_factor", "site test"),
    NUMBER("factors", "static", WITHIN(1.0, 10.0), "safety_factor", "still water"),
    NUMBER("factors", "steady", WITHIN(1.0, 10.0), "safety_factor", "steady flow"),
    NUMBER("factors", "shut_off", WITHIN(1.0, 10.0), "safety_factor", "pump shut-off"),
    NUMBER("factors", "recurring", WITHIN(1.0, 10.0), "safety_factor",
           "scenarios of class recurring"),
    NUMBER("factors", "occasional", WITHIN(1.0, 10.0), "safety_factor",
           "scenarios of class occasional"),
    NUMBER("factors", "exceptional", WITHIN(1.0, 10.0), "safety_factor",
           "scenarios of class exceptional"),
    NUMBER("factors", "suction", WITHIN(1.0, 10.0), "safety_factor",
           "lowest pressure, which pulls inwards"),

    WORD("solver", "friction", "none|constant|quasi-steady|unsteady", "quasi-steady",
         "friction in the surge"),
    WORD("solver", "column_separation", "none|vapour-cavity|gas-cavity", "gas-cavity",
         "what happens below the vapour limit"),
    SWITCH("solver", "grid_check", "true", "run a second, finer grid"),
    NUMBER("solver", "wave_speed_tolerance", WITHIN(0.0, 0.2), "0.02",
           "share by which a wave speed may be moved"),
    COUNT("solver", "min_reaches", WITHIN(1.0, 10000.0), "20",
          "reaches in the shortest pipe that is not lumped"),
    QUANTITY("solver", "time_step", KENT_TIME, BETWEEN(0.0, 1000.0), "chosen",
             "time step, in place of min_reaches"),
    COUNT("solver", "history_rows", WITHIN(100.0, 10000000.0), "20000",
          "rows of a history beyond which it is thinned"),
    SWITCH("solver", "creep", "false",
           "plastic walls creep, by their material where the pipe states nothing"),

    REF("design_rules", "set", "rule",
        "common-practice, or common-practice-US by units",
        "set of the catalogue of rules"),
    RULE_VALUES("design_rules", "the set's", "the set's"),

    ID("pump", "id", "required", "its name"),
    REF("pump", "at", "point", "required", "point where it stands"),
    REF("pump", "flow_to", "point", "none", "next point that it delivers to, in line"),
    QUANTITY("pump", "suction_level", KENT_LENGTH, WITHIN(-1000.0, 9000.0), "none",
             "level it draws from, at the start of a pipe"),
    COUNT("pump", "in_parallel", WITHIN(1.0, 20.0), "1", "units side by side"),
    COUNT("pump", "running", WITHIN(0.0, 20.0), "in_parallel",
          "units that run in the steady state"),
    LIST("pump", "flow_head", "", "required",
         "pairs (flow, head) of one unit at its rated speed, flow rising from 0"),
    LIST("pump", "flow_efficiency", "", "none", "pairs (flow, efficiency) of one unit"),
    LIST("pump", "rated", "", "required",
         "the pair (flow, head) where its efficiency is best"),
    NUMBER("pump", "efficiency", BETWEEN(0.0, 1.0), "flow_efficiency's",
           "efficiency at the rated flow"),
    QUANTITY("pump", "speed", KENT_ROTATION, BETWEEN(0.0, 2000.0), "required",
             "rated speed"),
    COUNT("pump", "stages", WITHIN(1.0, 100.0), "1", "stages of one unit"),
    COUNT("pump", "suctions", WITHIN(1.0, 2.0), "1", "2: double suction"),
    QUANTITY("pump", "inertia", KENT_INERTIA, BETWEEN(0.0, 1e7), "estimated",
             "moment of inertia of one unit: pump with water, motor, flywheel"),
    WORD("pump", "check_valve", "none|ideal|delayed", "ideal",
         "check valve behind every unit: it shuts as the flow reverses, or later"),
    QUANTITY("pump", "check_valve_delay", KENT_TIME, BETWEEN(0.0, 60.0), "none",
             "time from reversal to closure of a delayed one"),
    NUMBER("pump", "check_valve_loss", WITHIN(0.0, 1e6), "0.0",
           "K of it on check_valve_size when open"),
    QUANTITY("pump", "check_valve_size", KENT_DIAMETER, BETWEEN(0.0, 20.0), "none",
             "its bore, which check_valve_loss refers to"),

    ID("check_valve", "id", "required", "its name"),
    REF("check_valve", "at", "point", "required", "point where it stands"),
    REF("check_valve", "flow_to", "point", "required", "next point in flow direction"),
    QUANTITY("check_valve", "size", KENT_DIAMETER, BETWEEN(0.0, 20.0), "required",
             "nominal bore, which loss refers to"),
    NUMBER("check_valve", "loss", WITHIN(0.0, 1e6), "required", "K when open"),
    QUANTITY("check_valve", "delay", KENT_TIME, WITHIN(0.0, 60.0), "0 s",
             "time from reversal of the flow to closure"),

    ID("control_valve", "id", "required", "its name"),
    REF("control_valve", "at", "point", "required", "point where it stands"),
    REF("control_valve", "flow_to", "point", "required",
        "next point in flow direction"),
    WORD("control_valve", "holds", "downstream|upstream", "required",
         "side whose pressure it holds: behind it at most, before it at least"),
    QUANTITY("control_valve", "set_pressure", KENT_PRESSURE, BETWEEN(0.0, 1e8),
             "required", "pressure it holds"),
    QUANTITY("control_valve", "size", KENT_DIAMETER, BETWEEN(0.0, 20.0), "required",
             "nominal bore, which loss refers to"),
    CAPACITY("control_valve"),
    QUANTITY("control_valve", "opening_time", KENT_TIME, WITHIN(0.0, 1e4), "required",
             "time of its whole stroke, opening"),
    QUANTITY("control_valve", "closure_time", KENT_TIME, WITHIN(0.0, 1e4), "required",
             "time of its whole stroke, closing"),

    ID("surge_tank", "id", "required", "its name"),
    REF("surge_tank", "at", "point", "required", "point beside which it stands"),
    NEXT_TO("surge_tank"),
    QUANTITY("surge_tank", "area", KENT_AREA, BETWEEN(0.0, 1e6), "required",
             "of its water surface"),
    QUANTITY("surge_tank", "bottom_level", KENT_LENGTH, WITHIN(-1000.0, 9000.0),
             "required", "its bottom"),
    QUANTITY("surge_tank", "overflow_level", KENT_LENGTH, WITHIN(-1000.0, 9000.0),
             "none", "level at which it overflows"),
    CONNECTION("surge_tank"),
    NUMBER("surge_tank", "loss_in", WITHIN(0.0, 1e6), "0.0", "K into the tank"),
    NUMBER("surge_tank", "loss_out", WITHIN(0.0, 1e6), "0.0", "K out of the tank"),

    ID("one_way_surge_tank", "id", "required", "its name"),
    REF("one_way_surge_tank", "at", "point", "required",
        "point beside which it stands"),
    NEXT_TO("one_way_surge_tank"),
    QUANTITY("one_way_surge_tank", "area", KENT_AREA, BETWEEN(0.0, 1e6), "required",
             "of its water surface"),
    QUANTITY("one_way_surge_tank", "level", KENT_LENGTH, WITHIN(-1000.0, 9000.0),
             "required", "water level in the steady state"),
    QUANTITY("one_way_surge_tank", "bottom_level", KENT_LENGTH, WITHIN(-1000.0, 9000.0),
             "never empty", "level at which it is empty"),
    CONNECTION("one_way_surge_tank"),
    NUMBER("one_way_surge_tank", "loss_out", WITHIN(0.0, 1e6), "0.0",
           "K out of the tank"),

    ID("air_vessel", "id", "required", "its name"),
    REF("air_vessel", "at", "point", "required", "point beside which it stands"),
    NEXT_TO("air_vessel"),
    QUANTITY("air_vessel", "total_volume", KENT_VOLUME, BETWEEN(0.0, 1e5), "required",
             "of gas and water"),
    QUANTITY("air_vessel", "gas_volume", KENT_VOLUME, BETWEEN(0.0, 1e5), "required",
             "of the gas in the steady state"),
    NUMBER("air_vessel", "polytropic_exponent", WITHIN(1.0, 1.4), "1.2",
           "exponent of the gas law: 1.0 slow, 1.4 quick"),
    QUANTITY("air_vessel", "water_level", KENT_LENGTH, WITHIN(-1000.0, 9000.0),
             "the point's", "level of its water in the steady state"),
    QUANTITY("air_vessel", "area", KENT_AREA, BETWEEN(0.0, 1e5), "level stays",
             "in plan, by which its level moves"),
    CONNECTION("air_vessel"),
    NUMBER("air_vessel", "loss_in", WITHIN(0.0, 1e6), "0.0", "K into the vessel"),
    NUMBER("air_vessel", "loss_out", WITHIN(0.0, 1e6), "0.0", "K out of the vessel"),

    ID("relief_valve", "id", "required", "its name"),
    REF("relief_valve", "at", "point", "required", "point beside which it stands"),
    NEXT_TO("relief_valve"),
    QUANTITY("relief_valve", "set_pressure", KENT_PRESSURE, BETWEEN(0.0, 1e9),
             "required", "pressure at which it starts to open"),
    QUANTITY("relief_valve", "full_open_pressure", KENT_PRESSURE, BETWEEN(0.0, 1e9),
             "required", "pressure at which it is fully open"),
    QUANTITY("relief_valve", "low_set_pressure", KENT_PRESSURE, WITHIN(-1e5, 1e9),
             "none", "fall of pressure that opens it before the surge returns"),
    QUANTITY("relief_valve", "hold_time", KENT_TIME, WITHIN(0.0, 1e4), "none",
             "time it then stays open"),
    QUANTITY("relief_valve", "size", KENT_DIAMETER, BETWEEN(0.0, 20.0), "required",
             "nominal bore, which loss refers to"),
    CAPACITY("relief_valve"),
    QUANTITY("relief_valve", "opening_time", KENT_TIME, WITHIN(0.0, 1e4), "0 s",
             "time of its whole stroke, opening"),
    QUANTITY("relief_valve", "closure_time", KENT_TIME, WITHIN(0.0, 1e4), "0 s",
             "time of its whole stroke, closing"),
    QUANTITY("relief_valve", "discharge_level", KENT_LENGTH, WITHIN(-1000.0, 9000.0),
             "the point's", "level it discharges to"),

    ID("air_valve", "id", "required", "its name"),
    REF("air_valve", "at", "point", "required", "point beside which it stands"),
    NEXT_TO("air_valve"),
    COUNT("air_valve", "in_parallel", WITHIN(1.0, 20.0), "1", "units side by side"),
    QUANTITY("air_valve", "admission_orifice", KENT_DIAMETER, BETWEEN(0.0, 2.0),
             "required", "diameter for air in"),
    QUANTITY("air_valve", "release_orifice", KENT_DIAMETER, BETWEEN(0.0, 2.0),
             "required", "diameter for air out"),
    NUMBER("air_valve", "admission_coefficient", BETWEEN(0.0, 1.0), "0.6",
           "discharge coefficient, in"),
    NUMBER("air_valve", "release_coefficient", BETWEEN(0.0, 1.0), "0.6",
           "discharge coefficient, out"),
    QUANTITY("air_valve", "switch_pressure", KENT_PRESSURE, BETWEEN(0.0, 1e7), "none",
             "pressure inside at which a non-slam valve goes over to switched_orifice"),
    QUANTITY("air_valve", "switched_orifice", KENT_DIAMETER, BETWEEN(0.0, 2.0), "none",
             "diameter for air out from then on"),

    ID("state", "id", "required", "its name"),
    LIST("state", "levels", "", "none", "pairs (point of a fixed level, level)"),
    NUMBER("state", "outflow_factor", WITHIN(0.0, 100.0), "1.0", "on every outflow"),
    NUMBER("state", "roughness_factor", BETWEEN(0.0, 100.0), "1.0",
           "on roughness, manning_n and friction_factor; hazen_williams_c is divided"),
    LIST("state", "running", "", "none", "pairs (pump, how many run)"),

    REF("ground_zone", "pipe", "pipe", "required", "pipe it lies along"),
    STATION("ground_zone", "from", "required", "station where it starts"),
    STATION("ground_zone", "to", "required", "station where it ends"),
    REF("ground_zone", "soil", "soil", "the ground's", "soil"),
    QUANTITY("ground_zone", "cover", KENT_LENGTH, WITHIN(0.0, 100.0), "the ground's",
             "ground to crown of the pipe"),
    QUANTITY_OR("ground_zone", "water_table", KENT_LENGTH, WITHIN(0.0, 1000.0), "none",
                "the ground's", "depth of ground water below ground"),
    WORD("ground_zone", "trench", TRENCHES, "the ground's",
         "kind of trench (AWWA C150)"),
    REF("ground_zone", "backfill", "soil", "the ground's",
        "soil that the trench is filled with"),
    SWITCH("ground_zone", "casing", "false",
           "the pipe runs in a casing: no ground holds it there"),

    VECTOR("branch", "direction", "to the left, without x and y",
           "out of the fitting: east, north, up"),
    QUANTITY("branch", "outside_diameter", KENT_DIAMETER, BETWEEN(0.0, 20.0),
             "required", "outside diameter"),
    QUANTITY("branch", "inside_diameter", KENT_DIAMETER, BETWEEN(0.0, 20.0),
             "the outside", "bore, of an open one"),
    WORD("branch", "joint", JOINTS, "flanged", "kind of joint"),
    WORD("branch", "end", "blank|valve|open", "required", "how it ends"),

    TEXT("obstacle", "what", 63, "required", "what it is"),
    VECTOR("obstacle", "direction", "required",
           "from the fitting's centre: east, north, up"),
    QUANTITY("obstacle", "distance", KENT_LENGTH, BETWEEN(0.0, 1000.0), "required",
             "level distance from the fitting's centre to its near side"),
    QUANTITY("obstacle", "depth", KENT_LENGTH, BETWEEN(0.0, 100.0), "required",
             "ground to its underside"),

    TEXT("as_built", "fitting", 47, "required", "the fitting's point, or its own id"),
    WORD("as_built", "block", "bearing|gravity|base", "as designed",
         "what was built: width x height x thickness of a face; of a gravity block "
         "width, height and the side along; of a base width, length and height"),
    QUANTITY("as_built", "width", KENT_LENGTH, BETWEEN(0.0, 50.0), "none", "as built"),
    QUANTITY("as_built", "height", KENT_LENGTH, BETWEEN(0.0, 50.0), "none", "as built"),
    QUANTITY("as_built", "thickness", KENT_LENGTH, BETWEEN(0.0, 50.0), "none",
             "as built"),
    QUANTITY("as_built", "face_width", KENT_LENGTH, BETWEEN(0.0, 50.0), "none",
             "of a face beside a gravity block or base"),
    QUANTITY("as_built", "face_height", KENT_LENGTH, BETWEEN(0.0, 50.0), "none",
             "of that face"),
    QUANTITY("as_built", "face_thickness", KENT_LENGTH, BETWEEN(0.0, 50.0), "none",
             "of that face"),
    QUANTITY("as_built", "axis_above", KENT_LENGTH, WITHIN(-10.0, 10.0), "0 m",
             "the pipe's axis above the middle of the face; negative: below it"),
    LIST("as_built", "restrained", "built_leg", "none",
         "joints restrained, leg by leg"),

    REF("built_leg", "towards", "point", "required", "the next point along that leg"),
    QUANTITY("built_leg", "length", KENT_LENGTH, WITHIN(0.0, 1e5), "required",
             "length over which every joint is restrained"),

    REF("concrete", "class", "concrete_row", "none",
        "class of the catalogue of concretes, whose strength it has"),
    QUANTITY(
        "concrete", "strength", KENT_STRENGTH, WITHIN(5e6, 1e8),
        "the class's, else a low one",
        "characteristic or specified, of a cylinder at 28 days, in place of class"),
    WORD("concrete", "cement", "normal|rapid|slow", "normal",
         "how its cement gains strength, for the age at the test"),

    /* ---- a standard table ------------------------------------------------------ */
    COUNT("standard_table", "format", WITHIN(1.0, 1.0), "required",
          "version of this format"),
    TEXT("standard_table", "title", 159, "the file's name",
         "what the table is called on sheets"),
    WORD("standard_table", "units", "SI|US", "SI", "units of what is displayed"),
    GROUP("standard_table", "project", "project", "none",
          "numbers and names for the sheets"),
    QUANTITY(
        "standard_table", "pressure", KENT_PRESSURE, BETWEEN(0.0, 5e7), "required",
        "design pressure at every fitting: the highest of service, surge and test"),
    LIST("standard_table", "sizes", "", "required",
         "ids of pipe classes of the catalogue, and groups, each a standard_size"),
    LIST("standard_table", "fittings", "", "required",
         "\"dead-end\", \"tee\", \"valve\", \"bend 45 deg\", \"crest 45 deg\", "
         "\"sag 45 deg\", \"wye 45 deg\""),
    LIST("standard_table", "soils", "", "required",
         "ids of soils of the catalogue, and groups, each a soil as in a case"),
    QUANTITY("standard_table", "cover", KENT_LENGTH, WITHIN(0.0, 100.0), "required",
             "ground to crown of the pipe"),
    QUANTITY_OR("standard_table", "water_table", KENT_LENGTH, WITHIN(0.0, 1000.0),
                "none", "none", "depth of ground water below ground"),
    WORD("standard_table", "trench", TRENCHES, "not stated",
         "kind of trench (AWWA C150)"),
    SWITCH("standard_table", "wrapped", "false", "pipes lie in polyethylene sleeves"),
    WORD("standard_table", "joint", JOINTS, "push-on", "kind of joint of every pipe"),
    NUMBER("standard_table", "safety_factor", WITHIN(1.0, 10.0), "the design rules'",
           "factor on the thrust"),
    WORD("standard_table", "thrust_area", AREAS, "outside",
         "diameter that the pressure acts on, as in a case"),
    GROUP("standard_table", "concrete", "concrete", "none",
          "concrete of the blocks, as in a case"),
    GROUP("standard_table", "design_rules", "design_rules", "none",
          "rules of block design, as in a case"),
    WORD("standard_table", "restraint", "thrust-block|restrained-joints|both", "both",
         "what is worked out"),

    TEXT("standard_size", "name", 31, "required", "what the size is called"),
    REF("standard_size", "pipe_class", "pipe_class", "none",
        "row of the catalogue of pipes"),
    REF("standard_size", "material", "material", "the class's",
        "row of the catalogue of materials, for the pipe's weight"),
    QUANTITY("standard_size", "outside_diameter", KENT_DIAMETER, BETWEEN(0.0, 20.0),
             "the class's", "outside diameter"),
    QUANTITY("standard_size", "wall_thickness", KENT_DIAMETER, BETWEEN(0.0, 2.0),
             "the class's", "nominal thickness of the structural wall"),
    QUANTITY("standard_size", "lining_thickness", KENT_DIAMETER, WITHIN(0.0, 0.5),
             "the class's, else 0 mm", "thickness of the lining"),
    QUANTITY("standard_size", "nominal_size", KENT_DIAMETER, BETWEEN(0.0, 20.0),
             "the class's", "size it is called by, of thrust_area \"nominal\""),
    QUANTITY("standard_size", "pipe_length", KENT_LENGTH, BETWEEN(0.0, 100.0), "none",
             "laying length of one pipe; restrained lengths are rounded up to it"),

    /* ---- files of the catalogue ----------------------------------------------- */
    COUNT("catalogue", "format", WITHIN(1.0, 1.0), "required",
          "version of this format"),
    LIST("catalogue", "standards", "standard", "none", "pipes, a table per standard"),
    LIST("catalogue", "materials", "material", "none", "materials of pipes"),
    LIST("catalogue", "valves", "valve_type", "none", "types of valve"),
    LIST("catalogue", "soils", "soil_row", "none", "presumptive bearings of soils"),
    LIST("catalogue", "concretes", "concrete_row", "none", "concretes by class"),
    LIST("catalogue", "rules", "rule", "none", "sets of design rules"),

    ID("standard", "id", "required", "first part of the ids of its pipes"),
    TEXT("standard", "standard", 95, "required", "standard with edition"),
    REF("standard", "material", "material", "required", "material of the wall"),
    WORD("standard", "unit", "mm|in", "required", "unit of the rows"),
    TEXT("standard", "before_size", 15, "", "what stands before the size in an id"),
    TEXT("standard", "after_size", 15, "", "what stands after the size in an id"),
    WORD("standard", "walls", "minimum|nominal", "required", "what the rows give"),
    QUANTITY("standard", "tolerance", KENT_DIAMETER, WITHIN(0.0, 0.01), "0 mm",
             "nominal less minimum wall: the part that is the same for all"),
    NUMBER("standard", "tolerance_per_size", WITHIN(0.0, 0.1), "0.0",
           "nominal less minimum wall: the part in proportion to the size"),
    NUMBER("standard", "tolerance_per_wall", WITHIN(0.0, 0.5), "0.0",
           "nominal less minimum wall: the part in proportion to the wall given"),
    LIST("standard", "tolerances", "", "none",
         "nominal less minimum wall: pairs (up to this size, so many units)"),
    NUMBER("standard", "surge_factor", WITHIN(1.0, 4.0), "1.0",
           "rating with surge over pressure_rating"),
    NUMBER("standard", "recurring_factor", WITHIN(1.0, 4.0), "none",
           "the same of surges that recur; without it they are as other surges"),
    QUANTITY("standard", "surge_addition", KENT_PRESSURE, WITHIN(0.0, 1e8), "none",
             "rating with surge less surge_factor x pressure_rating"),
    QUANTITY("standard", "test_addition", KENT_PRESSURE, WITHIN(0.0, 1e8), "none",
             "rating under test less that with surge"),
    LIST("standard", "classes", "pipe_column", "required", "classes, one per column"),
    LIST("standard", "rows", "", "required",
         "lists (size, outside diameter, lining, then the wall of each class that "
         "gives none itself; 0: not made)"),
    PROVENANCE("standard"),

    ID("pipe_column", "id", "required", "the class in the ids of its pipes"),
    QUANTITY("pipe_column", "pressure_rating", KENT_PRESSURE, BETWEEN(0.0, 1e9), "none",
             "pressure the class is rated for"),
    NUMBER("pipe_column", "diameter_ratio", WITHIN(3.0, 500.0), "none",
           "outside diameter over wall, in place of a column of walls"),
    QUANTITY("pipe_column", "wall", KENT_DIAMETER, BETWEEN(0.0, 1.0), "none",
             "one wall for every size, in place of a column of walls"),
    NUMBER("pipe_column", "least_size", WITHIN(0.0, 1e5), "any",
           "size from which the class is made"),
    NUMBER("pipe_column", "most_size", WITHIN(0.0, 1e5), "any",
           "size up to which the class is made"),

    ID("material", "id", "required", "its name"),
    QUANTITY("material", "elastic_modulus", KENT_MODULUS, WITHIN(1e7, 1e12), "required",
             "modulus, short-term"),
    NUMBER("material", "poisson_ratio", WITHIN(0.0, 0.5), "required",
           "Poisson's ratio"),
    QUANTITY("material", "density", KENT_DENSITY, WITHIN(500.0, 20000.0), "required",
             "density"),
    QUANTITY("material", "roughness", KENT_DIAMETER, WITHIN(0.0, 0.1), "required",
             "equivalent sand roughness of the usual inside"),
    QUANTITY("material", "lining_modulus", KENT_MODULUS, WITHIN(0.0, 1e12), "0 GPa",
             "modulus of the usual lining"),
    QUANTITY("material", "expansion", KENT_EXPANSION, WITHIN(0.0, 1e-3), "none",
             "thermal expansion of length"),
    QUANTITY("material", "long_modulus", KENT_MODULUS, WITHIN(1e7, 1e12), "none",
             "modulus of a plastic under lasting load"),
    SWITCH("material", "plastic", "false", "creeps, and is weaker when warm"),
    LIST("material", "creep", "", "none", "pairs (retardation time, compliance)"),
    QUANTITY("material", "creep_temperature", KENT_TEMPERATURE, WITHIN(273.15, 373.15),
             "none", "temperature that creep was found at"),
    LIST("material", "derating", "", "none",
         "pairs (temperature, share of the ratings that is left), of a plastic"),
    PROVENANCE("material"),

    ID("valve_type", "id", "required", "its name"),
    LIST("valve_type", "characteristic", "", "none",
         "pairs (opening, K); without it the case has to give its own"),
    NUMBER("valve_type", "loss", BETWEEN(0.0, 1e9), "none",
           "K fully open; required without characteristic"),
    PROVENANCE("valve_type"),

    ID("soil_row", "id", "required", "its name, with its USCS symbol"),
    SOIL_VALUES("soil_row", "one of the four bearings"),
    PROVENANCE("soil_row"),

    TEXT("concrete_row", "id", 39, "required", "name of the class, as \"C25/30\""),
    QUANTITY("concrete_row", "strength", KENT_STRENGTH, WITHIN(5e6, 1e8), "required",
             "characteristic or specified, of a cylinder at 28 days"),
    PROVENANCE("concrete_row"),

    ID("rule", "id", "required", "name of the set"),
    TEXT("rule", "based_on", 39, "none",
         "set above it in the file, whose values hold where none is given"),
    RULE_VALUES("rule", "required, or that of based_on",
                "nothing asked, or that of based_on"),
    TEXT("rule", "soils", 15, "any",
         "last word of the ids of the soils that safety_factor is meant for"),
    PROVENANCE("rule"),
};

const size_t KENT_KEY_COUNT = sizeof KENT_KEYS / sizeof KENT_KEYS[0];

static const struct {
    const char *group, *word;
} GROUP_WORDS[] = {
    {"case", "a case"},
    {"project", "project"},
    {"water", "water"},
    {"site", "site"},
    {"point", "a point"},
    {"pipe", "a pipe"},
    {"fixed_level", "a fixed level"},
    {"outflow", "an outflow"},
    {"valve", "a valve"},
    {"scenario", "a scenario"},
    {"event", "an event"},
    {"soil", "a soil"},
    {"ground", "ground"},
    {"fitting", "a fitting"},
    {"ground_slope", "ground_slope"},
    {"port", "a port"},
    {"concrete", "concrete"},
    {"loads", "loads"},
    {"limits", "limits"},
    {"factors", "factors"},
    {"bearing_increase", "bearing_increase"},
    {"tables", "tables"},
    {"state", "a state"},
    {"pump", "a pump"},
    {"check_valve", "a check valve"},
    {"control_valve", "a control valve"},
    {"surge_tank", "a surge tank"},
    {"one_way_surge_tank", "a one-way surge tank"},
    {"air_vessel", "an air vessel"},
    {"relief_valve", "a relief valve"},
    {"air_valve", "an air valve"},
    {"ground_zone", "a ground zone"},
    {"branch", "a branch"},
    {"obstacle", "an obstacle"},
    {"solver", "solver"},
    {"design_rules", "design_rules"},
    {"as_built", "a fitting as built"},
    {"built_leg", "a restrained leg"},
    {"standard_table", "a standard table"},
    {"standard_size", "a size of a standard table"},
    {"catalogue", "a catalogue file"},
    {"standard", "a standard"},
    {"pipe_column", "a class of pipes"},
    {"pipe_class", "a pipe class of the catalogue"},
    {"material", "a material of the catalogue"},
    {"valve_type", "a valve type of the catalogue"},
    {"soil_row", "a soil of the catalogue"},
    {"concrete_row", "a concrete of the catalogue"},
    {"rule", "a set of design rules"},
};

const char *kent_key_group_word(const char *group)
{
    for (size_t i = 0; i < sizeof GROUP_WORDS / sizeof GROUP_WORDS[0]; i++) {
        if (strcmp(GROUP_WORDS[i].group, group) == 0) return GROUP_WORDS[i].word;
    }
    return group;
}

const kent_key *kent_key_group(const char *group, size_t *count)
{
    size_t first = 0;
    while (first < KENT_KEY_COUNT && strcmp(KENT_KEYS[first].group, group) != 0) {
        first++;
    }
    size_t end = first;
    while (end < KENT_KEY_COUNT && strcmp(KENT_KEYS[end].group, group) == 0) {
        end++;
    }
    *count = end - first;
    return *count > 0 ? &KENT_KEYS[first] : NULL;
}

const kent_key *kent_key_find(const char *group, const char *key)
{
    size_t count = 0;
    const kent_key *keys = kent_key_group(group, &count);
    for (size_t i = 0; i < count; i++) {
        if (strcmp(keys[i].key, key) == 0) return &keys[i];
    }
    return NULL;
}

const char *kent_key_nearest(const char *group, const char *key)
{
    size_t count = 0;
    const kent_key *keys = kent_key_group(group, &count);
    const char *best = NULL;
    size_t least = SIZE_MAX;
    for (size_t i = 0; i < count; i++) {
        const size_t distance = kent_text_misspelling(keys[i].key, key);
        if (distance < least) {
            least = distance;
            best = keys[i].key;
        }
    }
    return best;
}

void kent_key_range(const kent_key *key, kent_system system, char *out, size_t size)
{
    const bool quantity =
        key->value == KENT_VALUE_QUANTITY || key->value == KENT_VALUE_EITHER;
    const kent_kind kind = key->value == KENT_VALUE_QUANTITY ? key->kind : KENT_RATIO;
    const bool has_number =
        quantity || key->value == KENT_VALUE_NUMBER || key->value == KENT_VALUE_COUNT;
    const kent_display shown = kent_units_display(kind, system);
    const char *gap = shown.unit[0] != '\0' ? " " : "";
    const double least = kent_units_shown(kind, system, key->least);
    const int digits = system == KENT_SI ? 9 : 6; /* limits are round numbers of SI */
    const double most = kent_units_shown(kind, system, key->most);

    if (key->value == KENT_VALUE_TEXT && isfinite(key->most)) {
        (void)snprintf(out, size, "up to %g bytes", key->most);
    } else if (!has_number || (isinf(key->least) && isinf(key->most))) {
        (void)snprintf(out, size, "any");
    } else if (isinf(key->most)) {
        (void)snprintf(out, size, "%s %.*g%s%s",
                       key->above_least ? "above" : "at least", digits, least, gap,
                       shown.unit);
    } else if (key->least == key->most) {
        (void)snprintf(out, size, "%.*g%s%s", digits, most, gap, shown.unit);
    } else {
        (void)snprintf(out, size, "%s%.*g to %.*g%s%s",
                       key->above_least ? "above " : "", digits, least, digits, most,
                       gap, shown.unit);
    }
}

bool kent_key_is_required(const kent_key *key)
{
    return strcmp(key->fallback, "required") == 0;
}

const char *kent_spelling(const char *word)
{
    static const struct {
        const char *variant, *ours;
    } VARIANTS[] = {
        {"vapor", "vapour"},
        {"vapor_pressure", "vapour_pressure"},
        {"vapor-cavity", "vapour-cavity"},
        {"catalog", "catalogue"},
        {"non-return", "check"},
        {"non_return_valves", "check_valves"},
        {"non-return_valves", "check_valves"},
        {"non_return_valve", "check_valve"},
        {"taper", "reducer"},
        {"gray-iron", "grey-iron"},
    };
    for (size_t i = 0; i < sizeof VARIANTS / sizeof VARIANTS[0]; i++) {
        if (strcmp(VARIANTS[i].variant, word) == 0) return VARIANTS[i].ours;
    }
    return word;
}
