using Microsoft.EntityFrameworkCore.Migrations;

#nullable disable

namespace ModelLab.Store.Sqlite.Migrations
{
    /// <inheritdoc />
    public partial class Initial : Migration
    {
        /// <inheritdoc />
        protected override void Up(MigrationBuilder migrationBuilder)
        {
            migrationBuilder.CreateTable(
                name: "accounts",
                columns: table => new
                {
                    Id = table.Column<string>(type: "TEXT", nullable: false),
                    Name = table.Column<string>(type: "TEXT", maxLength: 200, nullable: false),
                    Active = table.Column<bool>(type: "INTEGER", nullable: false),
                    Administrator = table.Column<bool>(type: "INTEGER", nullable: false),
                    EnrolledAt = table.Column<long>(type: "INTEGER", nullable: false),
                    UserName = table.Column<string>(type: "TEXT", maxLength: 256, nullable: true),
                    NormalizedUserName = table.Column<string>(type: "TEXT", maxLength: 256, nullable: true),
                    Email = table.Column<string>(type: "TEXT", maxLength: 256, nullable: true),
                    NormalizedEmail = table.Column<string>(type: "TEXT", maxLength: 256, nullable: true),
                    EmailConfirmed = table.Column<bool>(type: "INTEGER", nullable: false),
                    PasswordHash = table.Column<string>(type: "TEXT", nullable: true),
                    SecurityStamp = table.Column<string>(type: "TEXT", nullable: true),
                    ConcurrencyStamp = table.Column<string>(type: "TEXT", nullable: true),
                    PhoneNumber = table.Column<string>(type: "TEXT", nullable: true),
                    PhoneNumberConfirmed = table.Column<bool>(type: "INTEGER", nullable: false),
                    TwoFactorEnabled = table.Column<bool>(type: "INTEGER", nullable: false),
                    LockoutEnd = table.Column<long>(type: "INTEGER", nullable: true),
                    LockoutEnabled = table.Column<bool>(type: "INTEGER", nullable: false),
                    AccessFailedCount = table.Column<int>(type: "INTEGER", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_accounts", x => x.Id);
                });

            migrationBuilder.CreateTable(
                name: "documents",
                columns: table => new
                {
                    ledger_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    collection = table.Column<string>(type: "TEXT", maxLength: 32, nullable: false),
                    id = table.Column<string>(type: "TEXT", maxLength: 400, nullable: false),
                    position = table.Column<int>(type: "INTEGER", nullable: false),
                    json = table.Column<string>(type: "TEXT", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_documents", x => new { x.ledger_id, x.collection, x.id });
                });

            migrationBuilder.CreateTable(
                name: "idempotency_records",
                columns: table => new
                {
                    person_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    key = table.Column<string>(type: "TEXT", maxLength: 200, nullable: false),
                    request_hash = table.Column<byte[]>(type: "BLOB", nullable: false),
                    status = table.Column<int>(type: "INTEGER", nullable: false),
                    content_type = table.Column<string>(type: "TEXT", maxLength: 200, nullable: true),
                    body = table.Column<byte[]>(type: "BLOB", nullable: false),
                    created_at = table.Column<long>(type: "INTEGER", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_idempotency_records", x => new { x.person_id, x.key });
                });

            migrationBuilder.CreateTable(
                name: "kept_contents",
                columns: table => new
                {
                    project_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    hash = table.Column<byte[]>(type: "BLOB", nullable: false),
                    source_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    nonce = table.Column<byte[]>(type: "BLOB", nullable: false),
                    ciphertext = table.Column<byte[]>(type: "BLOB", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_kept_contents", x => new { x.project_id, x.hash, x.source_id });
                });

            migrationBuilder.CreateTable(
                name: "ledger_entries",
                columns: table => new
                {
                    ledger_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    number = table.Column<long>(type: "INTEGER", nullable: false),
                    canonical_bytes = table.Column<byte[]>(type: "BLOB", nullable: false),
                    hash = table.Column<byte[]>(type: "BLOB", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_ledger_entries", x => new { x.ledger_id, x.number });
                });

            migrationBuilder.CreateTable(
                name: "ledger_heads",
                columns: table => new
                {
                    ledger_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    count = table.Column<long>(type: "INTEGER", nullable: false),
                    last_hash = table.Column<byte[]>(type: "BLOB", nullable: false),
                    frontier = table.Column<byte[]>(type: "BLOB", nullable: false),
                    generation = table.Column<int>(type: "INTEGER", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_ledger_heads", x => x.ledger_id);
                });

            migrationBuilder.CreateTable(
                name: "sources",
                columns: table => new
                {
                    project_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    source_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    sha256 = table.Column<byte[]>(type: "BLOB", nullable: false),
                    bytes = table.Column<long>(type: "INTEGER", nullable: false),
                    chunks = table.Column<int>(type: "INTEGER", nullable: false),
                    received_at = table.Column<long>(type: "INTEGER", nullable: false),
                    adopted = table.Column<bool>(type: "INTEGER", nullable: false),
                    adopted_at = table.Column<long>(type: "INTEGER", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_sources", x => new { x.project_id, x.source_id });
                });

            migrationBuilder.CreateTable(
                name: "store_facts",
                columns: table => new
                {
                    name = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    value = table.Column<string>(type: "TEXT", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_store_facts", x => x.name);
                });

            migrationBuilder.CreateTable(
                name: "account_claims",
                columns: table => new
                {
                    Id = table.Column<int>(type: "INTEGER", nullable: false)
                        .Annotation("Sqlite:Autoincrement", true),
                    UserId = table.Column<string>(type: "TEXT", nullable: false),
                    ClaimType = table.Column<string>(type: "TEXT", nullable: true),
                    ClaimValue = table.Column<string>(type: "TEXT", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_account_claims", x => x.Id);
                    table.ForeignKey(
                        name: "FK_account_claims_accounts_UserId",
                        column: x => x.UserId,
                        principalTable: "accounts",
                        principalColumn: "Id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "account_logins",
                columns: table => new
                {
                    LoginProvider = table.Column<string>(type: "TEXT", nullable: false),
                    ProviderKey = table.Column<string>(type: "TEXT", nullable: false),
                    ProviderDisplayName = table.Column<string>(type: "TEXT", nullable: true),
                    UserId = table.Column<string>(type: "TEXT", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_account_logins", x => new { x.LoginProvider, x.ProviderKey });
                    table.ForeignKey(
                        name: "FK_account_logins_accounts_UserId",
                        column: x => x.UserId,
                        principalTable: "accounts",
                        principalColumn: "Id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "account_tokens",
                columns: table => new
                {
                    UserId = table.Column<string>(type: "TEXT", nullable: false),
                    LoginProvider = table.Column<string>(type: "TEXT", nullable: false),
                    Name = table.Column<string>(type: "TEXT", nullable: false),
                    Value = table.Column<string>(type: "TEXT", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_account_tokens", x => new { x.UserId, x.LoginProvider, x.Name });
                    table.ForeignKey(
                        name: "FK_account_tokens_accounts_UserId",
                        column: x => x.UserId,
                        principalTable: "accounts",
                        principalColumn: "Id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "api_tokens",
                columns: table => new
                {
                    id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    person_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    name = table.Column<string>(type: "TEXT", maxLength: 200, nullable: false),
                    scope = table.Column<string>(type: "TEXT", maxLength: 16, nullable: false),
                    secret_hash = table.Column<byte[]>(type: "BLOB", nullable: false),
                    issued_at = table.Column<long>(type: "INTEGER", nullable: false),
                    expires_at = table.Column<long>(type: "INTEGER", nullable: false),
                    revoked_at = table.Column<long>(type: "INTEGER", nullable: true),
                    last_used_at = table.Column<long>(type: "INTEGER", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_api_tokens", x => x.id);
                    table.ForeignKey(
                        name: "FK_api_tokens_accounts_person_id",
                        column: x => x.person_id,
                        principalTable: "accounts",
                        principalColumn: "Id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "invitations",
                columns: table => new
                {
                    person_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    secret_hash = table.Column<byte[]>(type: "BLOB", nullable: false),
                    expires_at = table.Column<long>(type: "INTEGER", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_invitations", x => x.person_id);
                    table.ForeignKey(
                        name: "FK_invitations_accounts_person_id",
                        column: x => x.person_id,
                        principalTable: "accounts",
                        principalColumn: "Id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "sealed_parts",
                columns: table => new
                {
                    ledger_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    entry_number = table.Column<long>(type: "INTEGER", nullable: false),
                    source_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    nonce = table.Column<byte[]>(type: "BLOB", nullable: false),
                    ciphertext = table.Column<byte[]>(type: "BLOB", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_sealed_parts", x => new { x.ledger_id, x.entry_number });
                    table.ForeignKey(
                        name: "FK_sealed_parts_ledger_entries_ledger_id_entry_number",
                        columns: x => new { x.ledger_id, x.entry_number },
                        principalTable: "ledger_entries",
                        principalColumns: new[] { "ledger_id", "number" },
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "source_chunks",
                columns: table => new
                {
                    project_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    source_id = table.Column<string>(type: "TEXT", maxLength: 64, nullable: false),
                    chunk = table.Column<int>(type: "INTEGER", nullable: false),
                    ciphertext = table.Column<byte[]>(type: "BLOB", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_source_chunks", x => new { x.project_id, x.source_id, x.chunk });
                    table.ForeignKey(
                        name: "FK_source_chunks_sources_project_id_source_id",
                        columns: x => new { x.project_id, x.source_id },
                        principalTable: "sources",
                        principalColumns: new[] { "project_id", "source_id" },
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateIndex(
                name: "IX_account_claims_UserId",
                table: "account_claims",
                column: "UserId");

            migrationBuilder.CreateIndex(
                name: "IX_account_logins_UserId",
                table: "account_logins",
                column: "UserId");

            migrationBuilder.CreateIndex(
                name: "accounts_by_email",
                table: "accounts",
                column: "NormalizedEmail",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "accounts_by_user_name",
                table: "accounts",
                column: "NormalizedUserName",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "IX_api_tokens_person_id",
                table: "api_tokens",
                column: "person_id");

            migrationBuilder.CreateIndex(
                name: "api_tokens_by_secret",
                table: "api_tokens",
                column: "secret_hash",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "documents_by_id",
                table: "documents",
                columns: new[] { "collection", "id" });

            migrationBuilder.CreateIndex(
                name: "documents_in_order",
                table: "documents",
                columns: new[] { "ledger_id", "collection", "position" });

            migrationBuilder.CreateIndex(
                name: "idempotency_records_by_time",
                table: "idempotency_records",
                column: "created_at");

            migrationBuilder.CreateIndex(
                name: "invitations_by_secret",
                table: "invitations",
                column: "secret_hash",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "sources_by_adoption",
                table: "sources",
                columns: new[] { "adopted", "received_at" });
        }

        /// <inheritdoc />
        protected override void Down(MigrationBuilder migrationBuilder)
        {
            migrationBuilder.DropTable(
                name: "account_claims");

            migrationBuilder.DropTable(
                name: "account_logins");

            migrationBuilder.DropTable(
                name: "account_tokens");

            migrationBuilder.DropTable(
                name: "api_tokens");

            migrationBuilder.DropTable(
                name: "documents");

            migrationBuilder.DropTable(
                name: "idempotency_records");

            migrationBuilder.DropTable(
                name: "invitations");

            migrationBuilder.DropTable(
                name: "kept_contents");

            migrationBuilder.DropTable(
                name: "ledger_heads");

            migrationBuilder.DropTable(
                name: "sealed_parts");

            migrationBuilder.DropTable(
                name: "source_chunks");

            migrationBuilder.DropTable(
                name: "store_facts");

            migrationBuilder.DropTable(
                name: "accounts");

            migrationBuilder.DropTable(
                name: "ledger_entries");

            migrationBuilder.DropTable(
                name: "sources");
        }
    }
}
