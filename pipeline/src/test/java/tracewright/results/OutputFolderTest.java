package tracewright.results;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static org.junit.jupiter.api.Assumptions.assumeTrue;

import java.io.BufferedReader;
import java.io.FileOutputStream;
import java.io.IOException;
import java.io.InputStreamReader;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.attribute.PosixFilePermissions;
import java.util.List;
import java.util.concurrent.TimeUnit;
import java.util.stream.Stream;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import tracewright.study.InputException;

@DisplayNameGeneration(ReplaceUnderscores.class)
class OutputFolderTest {

    @TempDir
    Path temporary;

    private Path folder;

    @BeforeEach
    void setUp() {
        folder = temporary.resolve("out");
    }

    @Test
    void given_no_folder_when_committed_then_it_appears_with_all_files_and_nothing_beside_it_but_the_lock() throws IOException {
        try (OutputFolder out = OutputFolder.open(folder)) {
            put(out, "results.json", "r");
            put(out, "plots/a.svg", "a");
            assertFalse(Files.exists(folder), "nothing is seen before commit");
            out.commit();
        }
        assertEquals(List.of(".tracewright-manifest", "plots/a.svg", "results.json"), files(folder));
        assertEquals("a", Files.readString(folder.resolve("plots/a.svg")));
        assertEquals(List.of(".out.lock", "out"), names(temporary));
    }

    @Test
    void given_missing_folders_above_when_opened_then_they_are_made() throws IOException {
        run(temporary.resolve("a/b/out"), "results.json");
        assertEquals(List.of(".tracewright-manifest", "results.json"), files(temporary.resolve("a/b/out")));
    }

    @Test
    void given_no_commit_when_closed_then_an_existing_folder_is_as_before_and_a_missing_one_still_missing() throws IOException {
        try (OutputFolder out = OutputFolder.open(folder)) {
            put(out, "results.json", "new");
        }
        assertEquals(List.of(".out.lock"), names(temporary));
        run(folder, "results.json", "plots/a.svg");
        try (OutputFolder out = OutputFolder.open(folder)) {
            put(out, "results.json", "new");
        }
        assertEquals("results.json", Files.readString(folder.resolve("results.json")));
        assertEquals(List.of(".tracewright-manifest", "plots/a.svg", "results.json"), files(folder));
    }

    @Test
    void given_a_former_run_when_replaced_then_its_stale_files_go_and_foreign_ones_stay() throws IOException {
        run(folder, "results.json", "plots/old.svg", "plots/same.svg", "gone/only.csv");
        Files.writeString(folder.resolve("notes.txt"), "mine");
        Files.writeString(folder.resolve("plots/mine.svg"), "mine");
        try (OutputFolder out = OutputFolder.open(folder)) {
            put(out, "results.json", "second");
            put(out, "plots/same.svg", "second");
            out.commit();
        }
        assertEquals(List.of(".tracewright-manifest", "notes.txt", "plots/mine.svg", "plots/same.svg", "results.json"), files(folder));
        assertEquals("second", Files.readString(folder.resolve("results.json")));
        assertEquals("second", Files.readString(folder.resolve("plots/same.svg")));
        assertFalse(Files.exists(folder.resolve("gone")), "a folder that only held a stale file goes with it");
        assertFalse(OutputFolder.isBeingReplaced(folder));
    }

    @Test
    void given_a_manifest_that_names_files_elsewhere_when_replaced_then_those_stay() throws IOException {
        Path outside = Files.writeString(temporary.resolve("precious.txt"), "mine");
        run(folder, "results.json");
        Path manifest = folder.resolve(Manifest.NAME);
        Files.writeString(manifest, Files.readString(manifest) + "../precious.txt\n" + outside + "\n");
        run(folder, "results.json");
        assertEquals("mine", Files.readString(outside));
    }

    @Test
    void given_a_link_in_place_of_a_stale_folder_when_replaced_then_what_it_leads_to_stays() throws IOException {
        run(folder, "results.json", "plots/a.svg");
        Path elsewhere = Files.createDirectory(temporary.resolve("elsewhere"));
        Files.writeString(elsewhere.resolve("a.svg"), "mine");
        Files.delete(folder.resolve("plots/a.svg"));
        Files.delete(folder.resolve("plots"));
        Files.createSymbolicLink(folder.resolve("plots"), elsewhere);
        run(folder, "results.json");
        assertEquals("mine", Files.readString(elsewhere.resolve("a.svg")));
    }

    @ParameterizedTest
    @ValueSource(strings = {"results.json", "report.html"})
    void given_a_foreign_file_of_an_output_name_when_opened_then_the_run_is_refused_before_any_work(String name) throws IOException {
        Files.createDirectory(folder);
        Files.writeString(folder.resolve(name), "mine");
        InputException e = assertThrows(InputException.class, () -> OutputFolder.open(folder));
        assertEquals(InputException.Cause.USAGE, e.reason());
        assertTrue(e.getMessage().contains("did not write") && e.getMessage().contains(folder.resolve(name).toString()), e.getMessage());
        assertEquals("mine", Files.readString(folder.resolve(name)));
        assertEquals(List.of(".out.lock", "out"), names(temporary));
    }

    @Test
    void given_a_foreign_file_in_the_way_of_a_plot_when_committed_then_nothing_is_replaced() throws IOException {
        run(folder, "results.json");
        Files.writeString(folder.resolve("plots"), "a file, not a folder");
        try (OutputFolder out = OutputFolder.open(folder)) {
            put(out, "results.json", "second");
            put(out, "plots/a.svg", "second");
            InputException e = assertThrows(InputException.class, out::commit);
            assertTrue(e.getMessage().contains(folder.resolve("plots").toString()), e.getMessage());
        }
        assertEquals("results.json", Files.readString(folder.resolve("results.json")));
        assertFalse(OutputFolder.isBeingReplaced(folder));
    }

    @Test
    void given_an_open_folder_when_opened_again_then_the_second_run_is_told_who_holds_it_and_the_first_is_not_disturbed() throws IOException {
        try (OutputFolder out = OutputFolder.open(folder)) {
            put(out, "results.json", "first");
            for (int attempt = 0; attempt < 2; attempt++) {
                InputException e = assertThrows(InputException.class, () -> OutputFolder.open(folder));
                assertEquals(InputException.Cause.USAGE, e.reason());
                assertTrue(e.getMessage().contains("process " + ProcessHandle.current().pid()), e.getMessage());
            }
            out.commit();
        }
        assertEquals("first", Files.readString(folder.resolve("results.json")));
        run(folder, "results.json");
    }

    @Test
    void given_another_process_that_holds_the_folder_when_it_is_killed_then_the_next_run_takes_over_and_clears_its_leftovers() throws Exception {
        run(folder, "results.json");
        Process holder = holderProcess();
        try {
            InputException e = assertThrows(InputException.class, () -> OutputFolder.open(folder));
            assertTrue(e.getMessage().contains("process " + holder.pid() + " on host ") && e.getMessage().contains("since 2"), e.getMessage());
            holder.destroyForcibly();           // SIGKILL: nothing of its own can run any more
            assertTrue(holder.waitFor(10, TimeUnit.SECONDS));
        } finally {
            holder.destroyForcibly();
        }
        assertEquals("results.json", Files.readString(folder.resolve("results.json")), "the killed run changed nothing");
        assertEquals(List.of(".out.holder", ".out.lock", ".out.staging", "out"), names(temporary));
        try (OutputFolder out = OutputFolder.open(folder)) {
            assertEquals(List.of(), files(temporary.resolve(".out.staging")));
            put(out, "results.json", "next");
            out.commit();
        }
        assertEquals("next", Files.readString(folder.resolve("results.json")));
        assertEquals(List.of(".out.lock", "out"), names(temporary));
    }

    @Test
    void given_another_process_with_the_lock_but_no_holder_file_when_opened_then_the_lock_alone_refuses() throws Exception {
        Process holder = holderProcess();
        try {
            Files.delete(temporary.resolve(".out.holder"));
            InputException e = assertThrows(InputException.class, () -> OutputFolder.open(folder));
            assertTrue(e.getMessage().contains("in use by another process"), e.getMessage());
        } finally {
            holder.destroyForcibly();
            holder.waitFor(10, TimeUnit.SECONDS);
        }
    }

    @Test
    void given_a_holder_on_another_host_when_opened_then_the_remedy_names_the_file_to_delete() throws IOException {
        Path holder = Files.writeString(temporary.resolve(".out.holder"), "node-17.invalid\n4711\n2026-01-02T03:04:05Z\n");
        InputException e = assertThrows(InputException.class, () -> OutputFolder.open(folder));
        assertTrue(e.getMessage().contains("process 4711 on host node-17.invalid, which runs since 2026-01-02T03:04:05Z"), e.getMessage());
        assertTrue(e.getMessage().contains("delete " + holder), e.getMessage());
        Files.delete(holder);
        run(folder, "results.json");
    }

    @Test
    void given_a_holder_whose_process_id_now_belongs_to_a_later_process_when_opened_then_it_is_taken_over() throws IOException {
        FolderLock.Holder me = FolderLock.Holder.thisProcess();
        assumeTrue(me.since().isPresent(), "not run: this system does not tell when a process started");
        Files.writeString(temporary.resolve(".out.holder"), me.host() + "\n" + me.pid() + "\n1999-01-02T03:04:05Z\n");
        run(folder, "results.json");
    }

    @Test
    void given_an_unfinished_holder_file_when_opened_then_it_is_taken_over() throws IOException {
        Files.writeString(temporary.resolve(".out.holder"), "n1\n");
        run(folder, "results.json");
    }

    @Test
    void given_a_stop_in_the_middle_of_replacing_when_run_again_then_no_file_of_either_run_is_left_over() throws IOException {
        run(folder, "results.json", "plots/one.svg");
        // As a kill after the first renames leaves it: the manifest lists both runs, a plot of the second is in place.
        Files.writeString(folder.resolve(Manifest.NAME), "tracewright-manifest/1\nreplacing\nplots/one.svg\nplots/two.svg\nresults.json\n");
        Files.writeString(folder.resolve("plots/two.svg"), "second");
        assertTrue(OutputFolder.isBeingReplaced(folder));
        run(folder, "results.json");
        assertEquals(List.of(".tracewright-manifest", "results.json"), files(folder));
        assertFalse(OutputFolder.isBeingReplaced(folder));
    }

    @Test
    void given_a_full_disk_when_written_then_the_file_is_named_and_the_folder_is_as_before() throws IOException {
        Path full = Path.of("/dev/full");
        assumeTrue(Files.isWritable(full), "not run: this system has no /dev/full");
        run(folder, "results.json");
        try (OutputFolder out = OutputFolder.open(folder)) {
            IOException e = assertThrows(IOException.class, () -> out.write("results.json", stream -> {
                try (FileOutputStream f = new FileOutputStream(full.toFile())) {
                    f.write(1);
                }
            }));
            assertEquals("cannot write " + folder.resolve("results.json") + ": No space left on device", e.getMessage());
        }
        assertEquals("results.json", Files.readString(folder.resolve("results.json")));
        assertEquals(List.of(".out.lock", "out"), names(temporary));
    }

    @Test
    void given_a_parent_without_write_permission_when_opened_then_the_message_says_so_and_what_to_do() throws IOException {
        Path locked = Files.createDirectory(temporary.resolve("locked"));
        Files.setPosixFilePermissions(locked, PosixFilePermissions.fromString("r-xr-xr-x"));
        assumeTrue(!Files.isWritable(locked), "not run: this user may write everywhere");
        InputException e = assertThrows(InputException.class, () -> OutputFolder.open(locked.resolve("out")));
        assertTrue(e.getMessage().contains("permission denied") && e.getMessage().contains(locked.toString()) && e.getMessage().contains("--out"),
            e.getMessage());
    }

    @Test
    void given_a_parent_where_nobody_can_make_files_when_opened_then_it_is_a_usage_error_that_names_it() {
        Path proc = Path.of("/proc/self");
        assumeTrue(Files.isDirectory(proc), "not run: this system has no /proc");
        InputException e = assertThrows(InputException.class, () -> OutputFolder.open(proc.resolve("out")));
        assertEquals(InputException.Cause.USAGE, e.reason());
        assertTrue(e.getMessage().contains("nothing can be written beside the output folder"), e.getMessage());
    }

    @Test
    void given_a_file_in_place_of_the_folder_or_above_it_when_opened_then_it_is_named() throws IOException {
        Files.writeString(folder, "a file");
        for (Path p : List.of(folder, folder.resolve("below"))) {
            InputException e = assertThrows(InputException.class, () -> OutputFolder.open(p));
            assertTrue(e.getMessage().contains(folder.toString()) && e.getMessage().contains("--out"), e.getMessage());
        }
    }

    @Test
    void given_a_link_to_a_folder_when_committed_then_the_folder_is_filled_and_the_link_stays() throws IOException {
        Path real = Files.createDirectory(temporary.resolve("real"));
        Files.createSymbolicLink(folder, real);
        run(folder, "results.json");
        assertTrue(Files.isSymbolicLink(folder));
        assertEquals(List.of(".tracewright-manifest", "results.json"), files(real));
    }

    @ParameterizedTest
    @ValueSource(strings = {"../x", "/x", "plots/../x", "", ".tracewright-manifest", "a\nb"})
    void given_a_name_that_is_no_path_inside_when_written_then_it_is_refused(String name) throws IOException {
        try (OutputFolder out = OutputFolder.open(folder)) {
            assertThrows(IllegalArgumentException.class, () -> put(out, name, "x"));
        }
    }

    @Test
    void given_a_name_twice_when_written_then_the_second_is_refused() throws IOException {
        try (OutputFolder out = OutputFolder.open(folder)) {
            put(out, "results.json", "x");
            assertThrows(IllegalArgumentException.class, () -> put(out, "results.json", "y"));
        }
    }

    @Test
    void given_a_committed_folder_when_written_to_then_it_is_refused() throws IOException {
        try (OutputFolder out = OutputFolder.open(folder)) {
            out.commit();
            assertThrows(IllegalStateException.class, () -> put(out, "results.json", "x"));
            assertThrows(IllegalStateException.class, out::commit);
        }
    }

    /** Main class of the second process: takes the folder, writes half of its files, says so and waits to be killed. */
    static final class Holder {

        private Holder() {
        }

        public static void main(String[] arguments) throws IOException {
            try (OutputFolder out = OutputFolder.open(Path.of(arguments[0]))) {
                put(out, "results.json", "half");
                System.out.println("holding");
                System.in.read();
            }
        }
    }

    private Process holderProcess() throws IOException {
        Process process = new ProcessBuilder(Path.of(System.getProperty("java.home"), "bin", "java").toString(), "-XX:TieredStopAtLevel=1",
            "-XX:+UseSerialGC", "-cp", System.getProperty("java.class.path"), Holder.class.getName(), folder.toString())
            .redirectError(ProcessBuilder.Redirect.INHERIT).start();
        BufferedReader reader = new BufferedReader(new InputStreamReader(process.getInputStream(), StandardCharsets.UTF_8));
        assertEquals("holding", reader.readLine());
        return process;
    }

    /** A whole run whose files hold their own names. */
    private static void run(Path folder, String... names) throws IOException {
        try (OutputFolder out = OutputFolder.open(folder)) {
            for (String name : names) {
                put(out, name, name);
            }
            out.commit();
        }
    }

    private static void put(OutputFolder out, String name, String content) throws IOException {
        out.write(name, stream -> stream.write(content.getBytes(StandardCharsets.UTF_8)));
    }

    private static List<String> names(Path folder) throws IOException {
        try (Stream<Path> list = Files.list(folder)) {
            return list.map(p -> p.getFileName().toString()).sorted().toList();
        }
    }

    private static List<String> files(Path folder) throws IOException {
        try (Stream<Path> walk = Files.walk(folder)) {
            return walk.filter(Files::isRegularFile).map(p -> folder.relativize(p).toString()).sorted().toList();
        }
    }
}
