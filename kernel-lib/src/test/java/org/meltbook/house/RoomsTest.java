package org.meltbook.house;

import static com.tngtech.archunit.core.domain.JavaClass.Predicates.resideInAPackage;
import static com.tngtech.archunit.core.domain.JavaClass.Predicates.resideInAnyPackage;
import static com.tngtech.archunit.core.domain.JavaClass.Predicates.resideOutsideOfPackage;
import static com.tngtech.archunit.lang.syntax.ArchRuleDefinition.classes;
import static com.tngtech.archunit.lang.syntax.ArchRuleDefinition.noClasses;
import static com.tngtech.archunit.library.dependencies.SlicesRuleDefinition.slices;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.tngtech.archunit.core.domain.JavaClasses;
import com.tngtech.archunit.core.importer.ClassFileImporter;
import com.tngtech.archunit.core.importer.ImportOption;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.TreeSet;
import java.util.stream.Collectors;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;

/** Holds the table of rooms of DEVELOPERS.md: which package may use which. */
class RoomsTest {
    private static final String BASE = "org.meltbook.";
    private static final JavaClasses HOUSE = new ClassFileImporter()
            .withImportOption(new ImportOption.DoNotIncludeTests())
            .importPackages("org.meltbook");

    /** Each room and the rooms that it may use, with all that these may use in turn. */
    private static final Map<String, Set<String>> MAY_USE = closed();

    private static Map<String, Set<String>> closed() {
        Map<String, Set<String>> direct = new LinkedHashMap<>();
        direct.put("base", Set.of());
        direct.put("units", Set.of("base"));
        direct.put("numeric", Set.of("base"));
        direct.put("figure", Set.of("units"));
        direct.put("measure", Set.of("units", "figure"));
        direct.put("intake", Set.of("measure"));
        direct.put("fit", Set.of("numeric", "units", "figure"));
        direct.put("viscosity", Set.of("measure", "fit", "numeric"));
        direct.put("spectrum", Set.of("measure", "fit", "numeric"));
        direct.put("flow", Set.of("numeric", "units"));
        direct.put("constitutive", Set.of("flow", "spectrum", "viscosity", "numeric", "figure"));
        direct.put("table", Set.of("base", "measure"));
        direct.put("chart", Set.of("figure"));
        direct.put("kernel", Set.of());
        Set<String> domain = new TreeSet<>(direct.keySet());
        domain.removeAll(Set.of("table", "chart", "kernel"));
        direct.put("report", domain);
        direct.put("notebook", Set.copyOf(direct.keySet()));
        Map<String, Set<String>> all = new LinkedHashMap<>();
        direct.forEach((room, used) -> {
            Set<String> reach = new TreeSet<>();
            used.forEach(other -> {
                reach.add(other);
                reach.addAll(all.get(other));
            });
            all.put(room, reach);
        });
        return all;
    }

    static List<String> rooms() {
        return List.copyOf(MAY_USE.keySet());
    }

    @ParameterizedTest
    @MethodSource("rooms")
    void a_room_uses_only_what_the_table_allows(String room) {
        List<String> allowed = new ArrayList<>(List.of(BASE + room + ".."));
        MAY_USE.get(room).forEach(other -> allowed.add(BASE + other + ".."));
        classes()
                .that()
                .resideInAPackage(BASE + room + "..")
                .should()
                .onlyDependOnClassesThat(
                        resideOutsideOfPackage(BASE + "..").or(resideInAnyPackage(allowed.toArray(String[]::new))))
                .check(HOUSE);
    }

    @Test
    void no_room_reaches_back() {
        slices().matching("org.meltbook.(*)..").should().beFreeOfCycles().check(HOUSE);
    }

    @Test
    void every_package_is_in_the_table_and_enough_classes_were_read() {
        Set<String> found = HOUSE.stream()
                .map(type -> type.getPackageName().substring(BASE.length()).split("\\.")[0])
                .collect(Collectors.toCollection(TreeSet::new));
        assertEquals(new TreeSet<>(MAY_USE.keySet()), found);
        assertTrue(HOUSE.size() > 100, "only " + HOUSE.size() + " classes were read");
    }

    @Test
    void one_room_each_knows_tables_charts_and_file_dialects() {
        onlyRoom("table", "tech.tablesaw..", "notebook");
        onlyRoom("chart", "org.knowm.xchart..", "notebook");
        onlyRoom("intake", "de.siegmar.fastcsv..", "intake");
        onlyRoom("kernel", "jdk.jshell..", "kernel");
        onlyRoom("units", "javax.measure..", "units");
    }

    private static void onlyRoom(String room, String library, String alsoIn) {
        noClasses()
                .that(resideOutsideOfPackage(BASE + room + "..").and(resideOutsideOfPackage(BASE + alsoIn + "..")))
                .should()
                .dependOnClassesThat(resideInAPackage(library))
                .check(HOUSE);
    }

    @Test
    void nothing_reads_the_environment_but_the_kernel_and_the_command_line() {
        noClasses()
                .that(resideOutsideOfPackage(BASE + "kernel..").and(resideOutsideOfPackage(BASE + "notebook..")))
                .should()
                .callMethod(System.class, "getenv")
                .orShould()
                .callMethod(System.class, "getenv", String.class)
                .check(HOUSE);
    }
}
