using System.CommandLine;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield completion SHELL</c>: the script that makes a shell complete verbs and options.</summary>
internal static class CompletionVerb
{
    private const string Bash = """
        # polefield completion; add to ~/.bashrc: eval "$(polefield completion bash)"
        _polefield() {
            local IFS=$'\n'
            COMPREPLY=($(compgen -W "$(polefield "[suggest:${COMP_POINT}]" "${COMP_LINE}" 2>/dev/null)" -- "${COMP_WORDS[COMP_CWORD]}"))
            [ ${#COMPREPLY[@]} -eq 0 ] && COMPREPLY=($(compgen -f -- "${COMP_WORDS[COMP_CWORD]}"))
        }
        complete -o filenames -F _polefield polefield
        """;

    private const string Zsh = """
        # polefield completion; add to ~/.zshrc: eval "$(polefield completion zsh)"
        _polefield() {
            local -a found
            found=("${(@f)$(polefield "[suggest:${CURSOR}]" "${BUFFER}" 2>/dev/null)}")
            compadd -a found
            _files
        }
        compdef _polefield polefield
        """;

    private const string Fish = """
        # polefield completion; add to ~/.config/fish/config.fish: polefield completion fish | source
        complete -c polefield -a '(polefield "[suggest:"(string length -- (commandline -cp))"]" (commandline -cp) 2>/dev/null)'
        """;

    private const string PowerShell = """
        # polefield completion; add to $PROFILE: polefield completion pwsh | Out-String | Invoke-Expression
        Register-ArgumentCompleter -Native -CommandName polefield -ScriptBlock {
            param($word, $tree, $position)
            polefield "[suggest:$position]" "$tree" 2>$null | Where-Object { $_ -like "$word*" } | ForEach-Object {
                [System.Management.Automation.CompletionResult]::new($_, $_, 'ParameterValue', $_)
            }
        }
        """;

    public static VerbCommand Create(Tool tool)
    {
        var shell = new Argument<string>("SHELL") { Description = "bash, zsh, fish or pwsh." };
        shell.AcceptOnlyFromAmong("bash", "zsh", "fish", "pwsh");
        var verb = new VerbCommand("completion", "Prints the script that makes a shell complete verbs and options.")
        {
            Examples = [("eval \"$(polefield completion bash)\"", "completion in this shell, from now on")],
        };
        verb.Arguments.Add(shell);
        tool.SetRun(verb, (arguments, _) =>
        {
            tool.Terminal.Out.WriteLine(arguments.GetValue(shell) switch
            {
                "zsh" => Zsh,
                "fish" => Fish,
                "pwsh" => PowerShell,
                _ => Bash,
            });
            return ExitStatus.Done;
        });
        return verb;
    }
}
