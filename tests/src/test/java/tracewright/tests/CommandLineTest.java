package tracewright.tests;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.nio.file.Path;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

@DisplayNameGeneration(ReplaceUnderscores.class)
class CommandLineTest {

    @TempDir
    Path folder;

    @Test
    void given_help_when_asked_then_all_commands_and_exit_statuses_are_listed() throws Exception {
        Program.Ended help = Program.run(folder, "--help");
        assertEquals(0, help.status());
        for (String word : new String[] {"run STUDY", "validate STUDY", "synth STUDY-OF-TRUTH", "exit status", "example: tracewright run"}) {
            assertTrue(help.out().contains(word), word + " in\n" + help.out());
        }
    }

    @ParameterizedTest
    @ValueSource(strings = {"run", "validate", "synth"})
    void given_help_of_a_command_when_asked_then_it_ends_with_an_example(String command) throws Exception {
        Program.Ended help = Program.run(folder, command, "--help");
        assertEquals(0, help.status());
        String[] lines = help.out().strip().split("\n");
        assertTrue(lines[lines.length - 1].startsWith("example: tracewright " + command), help.out());
    }

    @Test
    void given_no_command_when_run_then_help_goes_to_standard_error_with_status_2() throws Exception {
        Program.Ended none = Program.run(folder);
        assertEquals(2, none.status());
        assertTrue(none.err().contains("usage: tracewright COMMAND"), none.err());
        assertEquals("", none.out());
    }

    @Test
    void given_a_misspelt_command_or_option_when_run_then_the_nearest_is_named_and_the_status_is_2() throws Exception {
        Program.Ended command = Program.run(folder, "runn", "study.yaml");
        assertEquals(2, command.status());
        assertTrue(command.err().contains("there is no command 'runn'; did you mean 'run'?"), command.err());
        Program.Ended option = Program.run(folder, "run", "study.yaml", "--thread", "2");
        assertEquals(2, option.status());
        assertTrue(option.err().contains("--threads"), option.err());
    }

    @Test
    void given_a_study_that_does_not_exist_when_run_then_it_says_so_with_status_2() throws Exception {
        Program.Ended missing = Program.run(folder, "run", "nothing.yaml");
        assertEquals(2, missing.status());
        assertTrue(missing.err().contains("there is no such file") && missing.err().contains("nothing.yaml"), missing.err());
    }

    @Test
    void given_the_version_when_asked_then_it_is_that_of_the_jar() throws Exception {
        assertEquals("tracewright 0.1.0\n", Program.run(folder, "--version").out());
    }
}
